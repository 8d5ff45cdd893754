import type { ReactNode } from 'react';
import type { SiteAccount } from '../../../../shared/contracts/account.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { asProblem } from '../../lib/problem-error.ts';
import { useUpdateSiteAccount } from './update-site-account.ts';

type AskedAct = 'make-admin' | 'end-admin' | 'close';

interface AccountActDialogProps {
  act: AskedAct;
  account: SiteAccount;
  onClose: () => void;
}

interface ActText {
  title: string;
  loses: ReactNode[];
  keeps: string;
  confirmLabel: string;
  done: string;
  change: { siteAdmin?: boolean; closed?: boolean };
}

/** Asks before an account's powers change. */
export function AccountActDialog({ act, account, onClose }: AccountActDialogProps) {
  const update = useUpdateSiteAccount();
  const text = describeAct(act, account.name);
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={text.title}
      loses={text.loses}
      keeps={text.keeps}
      confirmLabel={text.confirmLabel}
      cancelLabel="Leave as it is"
      isDanger={act === 'close'}
      isPending={update.isPending}
      error={update.error ? asProblem(update.error) : null}
      onConfirm={() =>
        update.mutate(
          { accountId: account.id, change: text.change },
          {
            onSuccess: () => {
              sayDone(text.done);
              onClose();
            },
          },
        )
      }
    />
  );
}

function describeAct(act: AskedAct, name: string): ActText {
  if (act === 'close') {
    return {
      title: `Close the account of ${name}?`,
      loses: [`${name} is signed out everywhere and cannot sign in`],
      keeps:
        'Samples and runs stay, credited to them, and so do their places in projects. You can open the account again.',
      confirmLabel: 'Close account',
      done: `The account of ${name} is closed`,
      change: { closed: true },
    };
  }
  const makes = act === 'make-admin';
  return {
    title: makes ? `Make ${name} site administrator?` : `End site administration by ${name}?`,
    loses: [],
    keeps: makes
      ? 'They will create and close accounts, send links and see what storage is used. They see no project by it.'
      : 'They keep their account and their projects.',
    confirmLabel: makes ? 'Make site administrator' : 'End site administration',
    done: makes ? `${name} is site administrator` : `${name} is no longer site administrator`,
    change: { siteAdmin: makes },
  };
}
