import { FolderOpen } from 'lucide-react';
import { type ReactNode, useRef, useState } from 'react';
import { Button } from '../../components/ui/button.tsx';
import { classNames } from '../../lib/class-names.ts';

interface DropAreaProps {
  /** What the button says: "Choose files…". */
  buttonLabel: string;
  /** Endings offered by the file dialog; dropping takes anything. */
  accept: string;
  isMultiple?: boolean;
  onFiles: (files: File[]) => void;
  children: ReactNode;
}

/** Takes files by dropping or by choosing. */
export function DropArea({ buttonLabel, accept, isMultiple = false, onFiles, children }: DropAreaProps) {
  const input = useRef<HTMLInputElement>(null);
  const [isOver, setIsOver] = useState(false);
  return (
    <div
      onDragOver={(event) => {
        event.preventDefault();
        setIsOver(true);
      }}
      onDragLeave={() => setIsOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        setIsOver(false);
        const files = [...event.dataTransfer.files];
        if (files.length > 0) onFiles(isMultiple ? files : files.slice(0, 1));
      }}
      className={classNames(
        'flex flex-wrap items-center gap-x-4 gap-y-3 rounded-lg border border-dashed px-4 py-4',
        isOver ? 'border-ink bg-groundsel-wash' : 'border-edge bg-sunken/50',
      )}
    >
      <div className="min-w-0 flex-1 basis-64 text-sm text-ink-soft">{children}</div>
      <Button icon={<FolderOpen />} onClick={() => input.current?.click()}>
        {buttonLabel}
      </Button>
      <input
        ref={input}
        type="file"
        multiple={isMultiple}
        accept={accept}
        tabIndex={-1}
        aria-hidden
        className="hidden"
        onChange={(event) => {
          const files = [...(event.target.files ?? [])];
          // The same file may be chosen again after it was taken out.
          event.target.value = '';
          if (files.length > 0) onFiles(files);
        }}
      />
    </div>
  );
}
