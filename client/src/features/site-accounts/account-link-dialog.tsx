import type { SiteAccount } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { AccountLinkNote, describeLink } from './account-link-note.tsx';
import { useSendAccountLink } from './send-account-link.ts';

/** Sends a new link to a person who cannot get in. */
export function AccountLinkDialog({ account, onClose }: { account: SiteAccount; onClose: () => void }) {
  const send = useSendAccountLink();
  const isWelcome = account.state === 'invited';
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title={isWelcome ? `Send a new welcome link to ${account.name}` : `Send a reset link to ${account.name}`}
      description={
        send.data
          ? describeLink(send.data)
          : isWelcome
            ? 'With it they choose a name and password. It holds for 14 days.'
            : 'With it they choose a new password. It holds for two hours; the present password works until then.'
      }
      footer={
        send.data ? (
          <Button kind="strong" onClick={onClose}>
            Done
          </Button>
        ) : (
          <>
            <Button onClick={onClose}>Cancel</Button>
            <Button
              kind="strong"
              isPending={send.isPending}
              pendingLabel="Sending…"
              onClick={() => send.mutate(account.id)}
            >
              Send link
            </Button>
          </>
        )
      }
    >
      {send.data && <AccountLinkNote result={send.data} />}
      {send.error && <ErrorState error={send.error} isInline />}
    </Dialog>
  );
}
