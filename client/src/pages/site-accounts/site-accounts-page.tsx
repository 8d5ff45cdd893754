import { UserPlus } from 'lucide-react';
import { useCallback, useState } from 'react';
import { useOutletContext } from 'react-router-dom';
import type { Account, SiteAccount } from '../../../../shared/contracts/account.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayDone, sayProblem } from '../../components/ui/toaster.tsx';
import { AccountActDialog } from '../../features/site-accounts/account-act-dialog.tsx';
import { AccountLinkDialog } from '../../features/site-accounts/account-link-dialog.tsx';
import { type AccountAct, AccountsTable } from '../../features/site-accounts/accounts-table.tsx';
import { CreateAccountDialog } from '../../features/site-accounts/create-account-dialog.tsx';
import { useSiteAccounts } from '../../features/site-accounts/list-site-accounts.ts';
import { StorageFigures } from '../../features/site-accounts/storage-figures.tsx';
import { useUpdateSiteAccount } from '../../features/site-accounts/update-site-account.ts';
import { formatCount } from '../../lib/format.ts';

/** Accounts and storage of this site, for its administrators. */
export function SiteAccountsPage() {
  const { siteAdmin } = useOutletContext<Account>();
  if (!siteAdmin) {
    return (
      <ReadingPage header={<PageHeader title="Accounts and storage" />}>
        <ForbiddenState title="This is for site administrators">
          They make accounts and look after storage. Being one opens no project.
        </ForbiddenState>
      </ReadingPage>
    );
  }
  return <AdminAccounts />;
}

function AdminAccounts() {
  const { id: viewerId } = useOutletContext<Account>();
  const accounts = useSiteAccounts();
  const { mutate: update } = useUpdateSiteAccount();
  const [isCreating, setIsCreating] = useState(false);
  const [asked, setAsked] = useState<{ act: AccountAct; account: SiteAccount } | null>(null);
  const act = useCallback(
    (wanted: AccountAct, account: SiteAccount) => {
      // Opening an account again loses nothing, so it is not asked about.
      if (wanted !== 'open') return setAsked({ act: wanted, account });
      return update(
        { accountId: account.id, change: { closed: false } },
        { onSuccess: () => sayDone(`The account of ${account.name} is open again`), onError: sayProblem },
      );
    },
    [update],
  );
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Accounts and storage"
          crumb={accounts.data && formatCount(accounts.data.length, 'account')}
          action={
            <Button kind="primary" icon={<UserPlus />} onClick={() => setIsCreating(true)}>
              New account
            </Button>
          }
        />
      }
    >
      <Section title="Storage" className="mb-10">
        <StorageFigures />
      </Section>
      <Section title="Accounts">
        {accounts.isPending && <PendingState label="Loading accounts" shape="table" rows={6} />}
        {accounts.isError && <ErrorState error={accounts.error} onRetry={() => void accounts.refetch()} />}
        {accounts.data && <AccountsTable accounts={accounts.data} viewerId={viewerId} onAct={act} />}
      </Section>
      <CreateAccountDialog isOpen={isCreating} onOpenChange={setIsCreating} />
      {asked?.act === 'link' && <AccountLinkDialog account={asked.account} onClose={() => setAsked(null)} />}
      {asked && asked.act !== 'link' && asked.act !== 'open' && (
        <AccountActDialog act={asked.act} account={asked.account} onClose={() => setAsked(null)} />
      )}
    </ReadingPage>
  );
}
