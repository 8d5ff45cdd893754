import type { Project } from '../../../../shared/contracts/project.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';

/** What a lead may change about a project, besides its study area. */
export type ProjectDetails = Pick<
  Project,
  'name' | 'client' | 'description' | 'targetOverallAccuracy' | 'targetSamplesPerClass'
>;

export function detailsOf(project: ProjectDetails): ProjectDetails {
  const { name, client, description, targetOverallAccuracy, targetSamplesPerClass } = project;
  return { name, client, description, targetOverallAccuracy, targetSamplesPerClass };
}

const LABELS: { [K in keyof ProjectDetails]: [label: string, print: (value: ProjectDetails[K]) => string] } = {
  name: ['Name', String],
  client: ['Client', (client) => client || 'none'],
  description: ['What it is for', (description) => description || 'nothing written'],
  targetOverallAccuracy: ['Accuracy target', (share) => (share === null ? 'none' : formatPercent(share, 1))],
  targetSamplesPerClass: ['Samples target', (count) => (count === null ? 'none' : formatNumber(count))],
};

/** The details two versions disagree on, in words. */
export function differingDetails(theirs: ProjectDetails, mine: ProjectDetails) {
  const keys = Object.keys(LABELS) as (keyof ProjectDetails)[];
  return keys.filter((key) => theirs[key] !== mine[key]).map((key) => printRow(key, theirs, mine));
}

function printRow<K extends keyof ProjectDetails>(key: K, theirs: ProjectDetails, mine: ProjectDetails) {
  const [label, print] = LABELS[key];
  return { label, theirs: print(theirs[key]), mine: print(mine[key]) };
}
