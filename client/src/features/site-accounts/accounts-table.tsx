import { KeyRound, MoreHorizontal, ShieldCheck, ShieldOff, UserCheck, UserX } from 'lucide-react';
import { useMemo } from 'react';
import type { SiteAccount } from '../../../../shared/contracts/account.ts';
import { DataTable, type DataTableColumn } from '../../components/ui/data-table.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';
import { formatDate } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';

export type AccountAct = 'link' | 'make-admin' | 'end-admin' | 'close' | 'open';

interface AccountsTableProps {
  accounts: readonly SiteAccount[];
  viewerId: string;
  onAct: (act: AccountAct, account: SiteAccount) => void;
}

const STATE: Record<SiteAccount['state'], { tone: TagTone; text: string }> = {
  active: { tone: 'ok', text: 'open' },
  invited: { tone: 'plain', text: 'invited' },
  closed: { tone: 'danger', text: 'closed' },
};

/** All accounts, sortable and filterable, with what may be done to each. */
export function AccountsTable({ accounts, viewerId, onAct }: AccountsTableProps) {
  const columns = useMemo<DataTableColumn<SiteAccount>[]>(
    () => [
      {
        header: 'Name',
        accessorKey: 'name',
        sortingFn: 'text',
        cell: ({ row: { original } }) => (
          <>
            <span className="font-medium">{original.name}</span>
            {original.id === viewerId && <span className="ml-2 text-xs text-ink-soft">you</span>}
          </>
        ),
      },
      { header: 'E-mail', accessorKey: 'email', sortingFn: 'text' },
      {
        header: 'State',
        accessorKey: 'state',
        meta: { width: '7rem' },
        cell: ({ row: { original } }) => (
          <StateTag tone={STATE[original.state].tone}>{STATE[original.state].text}</StateTag>
        ),
      },
      {
        header: 'Site administrator',
        accessorKey: 'siteAdmin',
        meta: { width: '10rem' },
        cell: ({ row: { original } }) => (original.siteAdmin ? 'yes' : <span className="text-ink-soft">no</span>),
      },
      {
        header: 'Projects',
        accessorKey: 'projectCount',
        meta: { align: 'right', width: '6rem' },
        cell: ({ row: { original } }) => formatNumber(original.projectCount),
      },
      {
        header: 'Since',
        accessorKey: 'createdAt',
        meta: { align: 'right', width: '8rem' },
        cell: ({ row: { original } }) => (
          <span className="whitespace-nowrap text-ink-soft">{formatDate(original.createdAt)}</span>
        ),
      },
      {
        id: 'acts',
        header: () => <span className="sr-only">Change</span>,
        enableSorting: false,
        meta: { width: '3rem', align: 'right' },
        cell: ({ row: { original } }) => <AccountMenu account={original} onAct={(act) => onAct(act, original)} />,
      },
    ],
    [onAct, viewerId],
  );
  return (
    <DataTable
      label="Accounts of this site"
      rows={accounts}
      columns={columns}
      rowId={(account) => account.id}
      initialSorting={[{ id: 'name', desc: false }]}
      filterPlaceholder="Filter by name or e-mail"
      filterText={(account) => `${account.name} ${account.email}`}
      rowHeight={44}
      maxHeight="none"
    />
  );
}

function AccountMenu({ account, onAct }: { account: SiteAccount; onAct: (act: AccountAct) => void }) {
  const isClosed = account.state === 'closed';
  return (
    <Menu trigger={<IconButton label={`Change ${account.name}`} size="sm" icon={<MoreHorizontal />} />}>
      {!isClosed && (
        <>
          <MenuItem icon={<KeyRound />} onSelect={() => onAct('link')}>
            {account.state === 'invited' ? 'Send a new welcome link…' : 'Send a reset link…'}
          </MenuItem>
          <MenuItem
            icon={account.siteAdmin ? <ShieldOff /> : <ShieldCheck />}
            onSelect={() => onAct(account.siteAdmin ? 'end-admin' : 'make-admin')}
          >
            {account.siteAdmin ? 'End site administration…' : 'Make site administrator…'}
          </MenuItem>
          <MenuLine />
        </>
      )}
      {isClosed ? (
        <MenuItem icon={<UserCheck />} onSelect={() => onAct('open')}>
          Open the account again
        </MenuItem>
      ) : (
        <MenuItem icon={<UserX />} isDanger onSelect={() => onAct('close')}>
          Close the account…
        </MenuItem>
      )}
    </Menu>
  );
}
