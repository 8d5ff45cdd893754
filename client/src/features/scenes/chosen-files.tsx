import { X } from 'lucide-react';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatBytes } from '../../lib/format.ts';
import { type UploadLimits, checkFile } from './check-files.ts';

interface ChosenFilesProps {
  files: readonly File[];
  limits: UploadLimits | null;
  onRemove: (file: File) => void;
}

/** The files of a scene to be, with what is wrong with them. */
export function ChosenFiles({ files, limits, onRemove }: ChosenFilesProps) {
  return (
    <ul aria-label="Chosen files" className="divide-y divide-line border-y border-line text-sm">
      {files.map((file) => {
        const check = checkFile(file, limits);
        return (
          <li key={`${file.name} ${file.size}`} className="flex items-start gap-3 py-1.5">
            <div className="min-w-0 flex-1 pt-0.5">
              <p className="break-words">{file.name}</p>
              {check && (
                <p
                  className={classNames(
                    'text-xs',
                    check.kind === 'refusal' ? 'font-medium text-rust' : 'text-ink-soft',
                  )}
                >
                  {check.text}
                </p>
              )}
            </div>
            <span className="pt-0.5 text-ink-soft">{formatBytes(file.size)}</span>
            <IconButton size="sm" label={`Leave out ${file.name}`} icon={<X />} onClick={() => onRemove(file)} />
          </li>
        );
      })}
    </ul>
  );
}
