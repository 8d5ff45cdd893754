import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { formatBytes, formatCount } from '../../lib/format.ts';
import type { DeskUpload } from './upload-desk.ts';
import { bytesPerSecond, secondsLeft } from './upload-pace.ts';

interface UploadCardProps {
  upload: DeskUpload;
  onRetry: () => void;
  onDrop: () => void;
}

/** An upload on its way with bytes, speed and time left; or why it was refused. */
export function UploadCard({ upload, onRetry, onDrop }: UploadCardProps) {
  const { scene, state, sentBytes, totalBytes, pace, problem } = upload;
  const speed = bytesPerSecond(pace);
  return (
    <section aria-label={`Upload of ${scene.name}`} className="rounded-xl border border-line bg-card px-5 py-4">
      <h2 className="text-lg font-semibold">{scene.name}</h2>
      <p className="text-sm text-ink-soft">{formatCount(scene.files.length, 'file')} from this computer</p>
      {state === 'refused' ? (
        <>
          <ErrorState className="mt-3" error={problem} isInline />
          <div className="mt-3 flex gap-2">
            <Button size="sm" kind="strong" onClick={onRetry}>
              Send again
            </Button>
            <Button size="sm" onClick={onDrop}>
              Put away
            </Button>
          </div>
        </>
      ) : (
        <>
          <ProgressBar
            className="mt-3"
            label={state === 'received' ? 'Sent; the server is storing it' : 'Uploading'}
            done={sentBytes}
            total={totalBytes}
            formatAmount={formatBytes}
            secondsLeft={state === 'received' ? null : secondsLeft(pace, totalBytes)}
            // Once all is sent, the server takes it over; the ingest can be cancelled instead.
            action={
              state === 'sending' && (
                <Button size="sm" onClick={onDrop}>
                  Cancel upload
                </Button>
              )
            }
          />
          <p className="mt-1 text-xs text-ink-soft">
            {speed !== null && state === 'sending' && `${formatBytes(speed)} a second. `}
            It goes on while you use other pages of Groundsel; keep this tab open.
          </p>
        </>
      )}
    </section>
  );
}
