import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatBytes } from '../../lib/format.ts';
import { useStorage } from './get-storage.ts';

const PARTS = [
  ['sceneBytes', 'Scenes', 'Band files and their originals', 'bg-spruce'],
  ['runBytes', 'Runs', 'Class maps and their tables', 'bg-groundsel'],
  ['incomingBytes', 'Being uploaded', 'Files not taken in yet', 'bg-rust'],
] as const;

/** What the stored files take, beside what is free on the disk. */
export function StorageFigures() {
  const storage = useStorage();
  if (storage.isPending) return <PendingState label="Measuring storage" shape="figures" rows={4} />;
  if (storage.isError) return <ErrorState error={storage.error} onRetry={() => void storage.refetch()} isInline />;
  const used = PARTS.reduce((sum, [key]) => sum + storage.data[key], 0);
  const whole = used + storage.data.freeBytes;
  return (
    <div>
      <div aria-hidden className="flex h-2.5 gap-px overflow-hidden rounded-full bg-line">
        {PARTS.map(([key, , , fill]) => (
          <div key={key} className={fill} style={{ width: `${whole > 0 ? (100 * storage.data[key]) / whole : 0}%` }} />
        ))}
      </div>
      <dl className="mt-3 grid grid-cols-4 gap-x-8 gap-y-3 max-md:grid-cols-2">
        {PARTS.map(([key, name, note, fill]) => (
          <StorageFigure key={key} name={name} note={note} fill={fill} nBytes={storage.data[key]} />
        ))}
        <StorageFigure name="Free" note="On the disk the files lie on" fill="bg-line" nBytes={storage.data.freeBytes} />
      </dl>
    </div>
  );
}

function StorageFigure({ name, note, fill, nBytes }: { name: string; note: string; fill: string; nBytes: number }) {
  return (
    <div>
      <dt className="flex items-center gap-2 text-sm font-medium">
        <span aria-hidden className={`size-2.5 rounded-sm ring-1 ring-edge/50 ${fill}`} />
        {name}
      </dt>
      <dd>
        <span className="block text-xl font-medium tracking-tight">{formatBytes(nBytes)}</span>
        <span className="text-xs text-ink-soft">{note}</span>
      </dd>
    </div>
  );
}
