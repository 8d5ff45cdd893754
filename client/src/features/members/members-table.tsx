import { MoreHorizontal, Pencil, UserMinus } from 'lucide-react';
import { ROLE_TEXT } from '../../../../shared/constants/roles.ts';
import type { Member } from '../../../../shared/contracts/project.ts';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { StateTag } from '../../components/ui/state-tag.tsx';
import { formatDate } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';

interface MembersTableProps {
  members: readonly Member[];
  viewerId: string;
  canManage: boolean;
  onEditRoles: (member: Member) => void;
  onRemove: (member: Member) => void;
}

/** The project's people with their roles and how much they drew. */
export function MembersTable({ members, viewerId, canManage, onEditRoles, onRemove }: MembersTableProps) {
  return (
    <table aria-label="People in this project" className="w-full text-sm">
      <thead>
        <tr className="text-left text-ink-soft [&>th]:border-b [&>th]:border-edge [&>th]:pr-4 [&>th]:pb-1.5 [&>th]:font-medium">
          <th scope="col">Person</th>
          <th scope="col">Roles</th>
          <th scope="col" className="w-20 text-right">
            Samples
          </th>
          <th scope="col" className="w-36 pl-6">
            In since
          </th>
          {canManage && (
            <th scope="col" className="w-9">
              <span className="sr-only">Change</span>
            </th>
          )}
        </tr>
      </thead>
      <tbody>
        {members.map((member) => (
          <tr key={member.id} className="[&>*]:border-b [&>*]:border-line [&>*]:py-2.5 [&>*]:pr-4">
            <th scope="row" className="text-left font-normal">
              <span className="flex flex-wrap items-center gap-x-2">
                <span className="font-medium">{member.person.name}</span>
                {member.person.id === viewerId && <span className="text-xs text-ink-soft">you</span>}
                {member.invited && <StateTag>has not signed in yet</StateTag>}
              </span>
              <span className="block text-xs break-all text-ink-soft">{member.email}</span>
            </th>
            <td>{member.roles.map((role) => ROLE_TEXT[role].name).join(', ')}</td>
            <td className="text-right">{formatNumber(member.sampleCount)}</td>
            <td className="pl-6 whitespace-nowrap text-ink-soft">{formatDate(member.addedAt)}</td>
            {canManage && (
              <td className="pr-0!">
                <Menu
                  trigger={<IconButton label={`Change ${member.person.name}`} size="sm" icon={<MoreHorizontal />} />}
                >
                  <MenuItem icon={<Pencil />} onSelect={() => onEditRoles(member)}>
                    Change roles…
                  </MenuItem>
                  <MenuItem icon={<UserMinus />} isDanger onSelect={() => onRemove(member)}>
                    {member.person.id === viewerId ? 'Leave project…' : 'Remove from project…'}
                  </MenuItem>
                </Menu>
              </td>
            )}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
