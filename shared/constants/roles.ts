/** What a person may be in a project; one person may hold several. */
export const PROJECT_ROLES = ['lead', 'labeller', 'modeller', 'reviewer', 'client'] as const;
export type ProjectRole = (typeof PROJECT_ROLES)[number];

export const ROLE_TEXT: Record<ProjectRole, { name: string; does: string }> = {
  lead: { name: 'Lead', does: 'runs the project: people, class scheme, study area, handover' },
  labeller: { name: 'Labeller', does: 'draws and mends training samples' },
  modeller: { name: 'Modeller', does: 'starts and compares classification runs' },
  reviewer: { name: 'Reviewer', does: 'judges the accuracy of a map, changes nothing in it' },
  client: { name: 'Client', does: 'sees what was handed over' },
};
