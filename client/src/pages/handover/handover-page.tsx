import { Link } from 'react-router-dom';
import { KAPPA_CAUTION, MAP_CAUTIONS, THERMAL_CAUTION } from '../../../../shared/constants/cautions.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { Marked, ReadingPage, Section, Statement } from '../../components/layout/reading-page.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { ClientContents } from './client-contents.tsx';

/** What was handed over: nothing so far, and what it will be. The same page for the team and the client. */
export function HandoverPage() {
  const project = useProject();
  const isTeam = project.abilities.readScenes;
  return (
    <ReadingPage
      header={
        <PageHeader
          title={isTeam ? 'Handover' : 'Your map'}
          crumb={<span className="max-sm:hidden">{project.client && `For ${project.client}`}</span>}
        />
      }
    >
      <Statement
        above={isTeam ? `${project.name} · what ${project.client || 'the client'} sees` : project.name}
        below={
          isTeam ? (
            <p>
              People with the client role see this page and no draft: no scene, no sample, no run.{' '}
              <Link to={paths.members(project.id)} className="link">
                See who they are
              </Link>
            </p>
          ) : (
            <p>
              The team is at work on it. The map, its areas and its report will be here once they are handed over; you
              need not do anything.{' '}
              <Link to={paths.projects()} className="link">
                All your projects
              </Link>
            </p>
          )
        }
      >
        <Marked>Nothing</Marked> has been handed over yet.
      </Statement>
      <div className="grid gap-x-14 gap-y-9 lg:grid-cols-[minmax(0,7fr)_minmax(0,5fr)]">
        <Section
          title={isTeam ? 'What the client will see' : 'What you will see here'}
          note="From one run that was found good enough, and from nothing else."
        >
          <ClientContents />
        </Section>
        <Section title="What the map is not" note="Printed on the report, the client’s page and every export.">
          <ul className="text-sm">
            {[...MAP_CAUTIONS, THERMAL_CAUTION].map((caution) => (
              <li key={caution} className="border-t border-line py-2">
                {caution}
              </li>
            ))}
          </ul>
          <p className="mt-4 text-xs leading-relaxed text-ink-soft">{KAPPA_CAUTION}</p>
        </Section>
      </div>
    </ReadingPage>
  );
}
