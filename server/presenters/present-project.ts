import type { ProjectRole } from '../../shared/constants/roles.ts';
import type {
  Member,
  Project as ProjectContract,
  ProjectAbilities,
  ProjectSummary,
  Stage,
} from '../../shared/contracts/project.ts';
import type { z } from 'zod';
import type { activitySchema } from '../../shared/contracts/project.ts';
import type { Activity } from '../entities/activity.ts';
import type { Project } from '../entities/project.ts';
import { can } from '../policies/policy-table.ts';
import type { MemberRow } from '../services/memberships.ts';
import { boundsOf, type ProjectCounts } from '../services/projects.ts';

export function presentProjectSummary(project: Project, roles: readonly ProjectRole[]): ProjectSummary {
  return {
    id: project.id,
    name: project.name,
    client: project.client,
    description: project.description,
    roles: [...roles],
    createdAt: project.createdAt.toISOString(),
    updatedAt: project.updatedAt.toISOString(),
  };
}

function presentAbilities(roles: readonly ProjectRole[]): ProjectAbilities {
  return {
    manageProject: can('project.manage', roles),
    manageMembers: can('member.manage', roles),
    readScenes: can('scene.read', roles),
    manageScenes: can('scene.manage', roles),
    readClasses: can('class.read', roles),
    manageClasses: can('class.manage', roles),
    readSamples: can('sample.read', roles),
    drawSamples: can('sample.draw', roles),
    readRuns: can('run.read', roles),
    startRuns: can('run.start', roles),
    readAccuracy: can('accuracy.read', roles),
  };
}

/** The stages of the rail: a bud is done when its work can carry the next stage. */
function presentStages(counts: ProjectCounts): Stage[] {
  const state = (count: number, done: boolean) => (count === 0 ? 'empty' : done ? 'done' : 'part');
  return [
    { id: 'overview', state: 'done', count: null },
    { id: 'scenes', state: state(counts.scenes, counts.scenesReady === counts.scenes), count: counts.scenes },
    { id: 'classes', state: state(counts.classes, counts.classes >= 2), count: counts.classes },
    {
      id: 'samples',
      state: state(counts.samples, counts.classes >= 2 && counts.classesWithSamples === counts.classes),
      count: counts.samples,
    },
    { id: 'runs', state: state(counts.runs, counts.runsFinished > 0), count: counts.runs },
    { id: 'accuracy', state: counts.runsFinished > 0 ? 'part' : 'empty', count: null },
    { id: 'handover', state: 'empty', count: null },
  ];
}

/** A client is shown no counts: drafts are not for them. */
export function presentProject(
  project: Project,
  roles: readonly ProjectRole[],
  counts: ProjectCounts | null,
): ProjectContract {
  const abilities = presentAbilities(roles);
  const studyArea = abilities.readScenes ? project.studyArea : null;
  return {
    ...presentProjectSummary(project, roles),
    studyArea,
    studyAreaBounds: studyArea ? boundsOf(studyArea) : null,
    targetOverallAccuracy: project.targetOverallAccuracy,
    targetSamplesPerClass: project.targetSamplesPerClass,
    stages: counts ? presentStages(counts) : [],
    abilities,
    version: project.version,
  };
}

export function presentMember({ membership, sampleCount }: MemberRow): Member {
  return {
    id: membership.id,
    person: { id: membership.user.id, name: membership.user.name },
    email: membership.user.email,
    roles: membership.roles,
    invited: membership.user.passwordHash === null,
    sampleCount,
    addedAt: membership.createdAt.toISOString(),
  };
}

export function presentActivity(activity: Activity): z.infer<typeof activitySchema> {
  return {
    id: activity.id,
    at: activity.createdAt.toISOString(),
    who: activity.user?.name ?? null,
    text: activity.text,
    path: activity.path,
  };
}
