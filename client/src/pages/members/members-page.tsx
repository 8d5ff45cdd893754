import { UserPlus } from 'lucide-react';
import { useState } from 'react';
import { useNavigate, useOutletContext } from 'react-router-dom';
import { PROJECT_ROLES, ROLE_TEXT } from '../../../../shared/constants/roles.ts';
import type { Account } from '../../../../shared/contracts/account.ts';
import type { Member } from '../../../../shared/contracts/project.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { AddMemberDialog } from '../../features/members/add-member-dialog.tsx';
import { useMembers } from '../../features/members/list-members.ts';
import { MemberRolesDialog } from '../../features/members/member-roles-dialog.tsx';
import { MembersTable } from '../../features/members/members-table.tsx';
import { RemoveMemberDialog } from '../../features/members/remove-member-dialog.tsx';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** The people of a project and what each may do. */
export function MembersPage() {
  const project = useProject();
  const header = <PageHeader title="People and roles" />;
  // A client is not told who else works on the map.
  if (!project.abilities.readScenes) {
    return (
      <ReadingPage header={header}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  return <TeamMembers />;
}

function TeamMembers() {
  const project = useProject();
  const { id: viewerId } = useOutletContext<Account>();
  const navigate = useNavigate();
  const members = useMembers(project.id);
  const [isAdding, setIsAdding] = useState(false);
  const [editing, setEditing] = useState<Member | null>(null);
  const [removing, setRemoving] = useState<Member | null>(null);
  const canManage = project.abilities.manageMembers;
  return (
    <ReadingPage
      header={
        <PageHeader
          title="People and roles"
          crumb={members.data && formatCount(members.data.length, 'person', 'people')}
          action={
            canManage && (
              <Button kind="primary" icon={<UserPlus />} onClick={() => setIsAdding(true)}>
                Add a person
              </Button>
            )
          }
        />
      }
    >
      <div className="grid gap-x-14 gap-y-9 lg:grid-cols-[minmax(0,8fr)_minmax(0,4fr)]">
        <div className="min-w-0">
          {members.isPending && <PendingState label="Loading people" shape="table" />}
          {members.isError && <ErrorState error={members.error} onRetry={() => void members.refetch()} />}
          {members.data && (
            <MembersTable
              members={members.data}
              viewerId={viewerId}
              canManage={canManage}
              onEditRoles={setEditing}
              onRemove={setRemoving}
            />
          )}
          {!canManage && (
            <p className="mt-4 text-sm text-ink-soft">The project lead adds people and gives out roles.</p>
          )}
        </div>
        <Section title="What each role does" note="One person may hold several.">
          <dl className="text-sm">
            {PROJECT_ROLES.map((role) => (
              <div key={role} className="flex gap-4 border-t border-line py-2">
                <dt className="w-20 shrink-0 font-medium">{ROLE_TEXT[role].name}</dt>
                <dd className="text-ink-soft">{ROLE_TEXT[role].does}</dd>
              </div>
            ))}
          </dl>
        </Section>
      </div>
      <AddMemberDialog projectId={project.id} isOpen={isAdding} onOpenChange={setIsAdding} />
      {editing && (
        <MemberRolesDialog
          projectId={project.id}
          member={editing}
          isSelf={editing.person.id === viewerId}
          onClose={() => setEditing(null)}
        />
      )}
      {removing && (
        <RemoveMemberDialog
          projectId={project.id}
          member={removing}
          isSelf={removing.person.id === viewerId}
          onClose={() => setRemoving(null)}
          onRemoved={() => {
            const isSelf = removing.person.id === viewerId;
            setRemoving(null);
            if (isSelf) void navigate(paths.projects(), { replace: true });
          }}
        />
      )}
    </ReadingPage>
  );
}
