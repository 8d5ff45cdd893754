import { useState } from 'react';
import { Button } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { StateTag } from '../../components/ui/state-tag.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { describeBrowser } from './describe-browser.ts';
import { useDevices } from './list-devices.ts';
import { useSignOutEverywhere } from './sign-out-everywhere.ts';

/** Browsers signed in to the account, and the way to sign all of them out. */
export function DeviceList({ onSignedOut }: { onSignedOut: () => void }) {
  const devices = useDevices();
  const signOut = useSignOutEverywhere();
  const [isAsking, setIsAsking] = useState(false);
  if (devices.isPending) return <PendingState label="Loading signed-in browsers" shape="table" rows={2} />;
  if (devices.isError) return <ErrorState error={devices.error} onRetry={() => void devices.refetch()} isInline />;
  return (
    <>
      <ul className="border-t border-line text-sm">
        {devices.data.map((device) => (
          <li key={device.id} className="flex items-center gap-4 border-b border-line py-2.5">
            <span className="min-w-0 grow">
              <span className="block font-medium" title={device.userAgent}>
                {describeBrowser(device.userAgent)}
              </span>
              <span className="text-xs text-ink-soft">from {device.address}</span>
            </span>
            {device.current ? (
              <StateTag tone="ok">this browser</StateTag>
            ) : (
              <span className="text-xs text-ink-soft">seen {formatSince(device.lastSeenAt)}</span>
            )}
          </li>
        ))}
      </ul>
      <Button className="mt-3" onClick={() => setIsAsking(true)}>
        Sign out everywhere…
      </Button>
      <ConfirmDialog
        isOpen={isAsking}
        onOpenChange={setIsAsking}
        title="Sign out everywhere?"
        keeps="Every browser signed in to your account is signed out, this one too. Nothing you saved is lost; work under way on the server goes on."
        confirmLabel="Sign out everywhere"
        cancelLabel="Stay signed in"
        isPending={signOut.isPending}
        error={signOut.error ? asProblem(signOut.error) : null}
        onConfirm={() => signOut.mutate(undefined, { onSuccess: onSignedOut })}
      />
    </>
  );
}
