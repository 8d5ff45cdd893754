import { ChevronsUpDown, ListOrdered, LogOut, UserRound, UsersRound } from 'lucide-react';
import { paths } from '../../lib/paths.ts';
import { type ThemeChoice, useTheme } from '../../lib/theme.ts';
import { Menu, MenuChoice, MenuItem, MenuLine } from '../ui/menu.tsx';

export interface AccountMenuProps {
  name: string;
  /** Said under the name: roles in this project, or the e-mail address. */
  note: string;
  isSiteAdmin: boolean;
  onSignOut: () => void;
}

const THEMES: readonly { value: ThemeChoice; label: string }[] = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

/** Who is signed in, with the theme switch, the account page and the way out. */
export function AccountMenu({ name, note, isSiteAdmin, onSignOut }: AccountMenuProps) {
  const { choice, choose } = useTheme();
  const initials = name
    .split(/\s+/)
    .map((word) => word.charAt(0))
    .slice(0, 2)
    .join('');
  return (
    <Menu
      side="top"
      align="start"
      trigger={
        <button
          type="button"
          aria-label={`Account of ${name}`}
          className="flex w-full items-center gap-2 rounded-lg px-2.5 py-1.5 text-left hover:bg-sunken max-lg:w-auto max-lg:px-1.5"
        >
          <span className="hidden size-8 items-center justify-center rounded-full border border-edge bg-card text-xs font-medium max-lg:flex">
            {initials}
          </span>
          <span className="min-w-0 grow max-lg:hidden">
            <span className="block truncate text-sm font-medium">{name}</span>
            <span className="block truncate text-xs text-ink-soft">{note}</span>
          </span>
          <ChevronsUpDown aria-hidden className="size-3.5 shrink-0 text-ink-soft max-lg:hidden" />
        </button>
      }
    >
      <p className="px-2.5 pt-1.5 pb-1 text-sm">
        <span className="block font-medium">{name}</span>
        <span className="text-xs text-ink-soft">{note}</span>
      </p>
      <MenuLine />
      <MenuChoice label="Theme" value={choice} options={THEMES} onChange={choose} />
      <MenuLine />
      <MenuItem icon={<UserRound />} to={paths.account()}>
        Your account
      </MenuItem>
      {isSiteAdmin && (
        <MenuItem icon={<UsersRound />} to={paths.siteAccounts()}>
          Accounts and storage
        </MenuItem>
      )}
      {isSiteAdmin && (
        <MenuItem icon={<ListOrdered />} to={paths.siteQueue()}>
          Queue of all projects
        </MenuItem>
      )}
      <MenuItem icon={<LogOut />} onSelect={onSignOut}>
        Sign out
      </MenuItem>
    </Menu>
  );
}
