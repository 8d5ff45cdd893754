/** Every address of the product, in one place. Ids are UUIDs, so they need no escaping; tokens are escaped. */
export const paths = {
  home: () => '/',
  signIn: (backTo?: string) => (backTo ? `/sign-in?to=${encodeURIComponent(backTo)}` : '/sign-in'),
  forgotPassword: () => '/forgot-password',
  welcome: (token: string) => `/welcome/${encodeURIComponent(token)}`,
  projects: () => '/projects',
  account: () => '/account',
  siteAccounts: () => '/site/accounts',
  siteQueue: () => '/site/queue',
  project: (projectId: string) => `/projects/${projectId}`,
  overview: (projectId: string) => `/projects/${projectId}/overview`,
  scenes: (projectId: string) => `/projects/${projectId}/scenes`,
  scene: (projectId: string, sceneId: string) => `/projects/${projectId}/scenes/${sceneId}`,
  sceneBands: (projectId: string, sceneId: string) => `/projects/${projectId}/scenes/${sceneId}/bands`,
  classes: (projectId: string) => `/projects/${projectId}/classes`,
  samples: (projectId: string) => `/projects/${projectId}/samples`,
  blocks: (projectId: string) => `/projects/${projectId}/samples/blocks`,
  signatures: (projectId: string) => `/projects/${projectId}/samples/signatures`,
  /** The sampling desk with these samples shown and the first of them selected. */
  samplesChosen: (projectId: string, sampleIds: readonly string[]) =>
    `/projects/${projectId}/samples?samples=${sampleIds.join(',')}`,
  runs: (projectId: string) => `/projects/${projectId}/runs`,
  /** With `fromRunId`, the recipe of that run is filled in. */
  newRun: (projectId: string, fromRunId?: string) =>
    `/projects/${projectId}/runs/new${fromRunId ? `?from=${fromRunId}` : ''}`,
  newRunByRecipe: (projectId: string, recipeId: string) => `/projects/${projectId}/runs/new?recipe=${recipeId}`,
  newRunByTrial: (projectId: string, tuningId: string, trial: number) =>
    `/projects/${projectId}/runs/new?tuning=${tuningId}&trial=${trial}`,
  queue: (projectId: string) => `/projects/${projectId}/runs/queue`,
  recipes: (projectId: string) => `/projects/${projectId}/runs/recipes`,
  tunings: (projectId: string) => `/projects/${projectId}/runs/tunings`,
  tuning: (projectId: string, tuningId: string) => `/projects/${projectId}/runs/tunings/${tuningId}`,
  /** With a run or a named recipe, its settings are where the search begins. */
  newTuning: (projectId: string, of: { runId?: string; recipeId?: string } = {}) =>
    `/projects/${projectId}/runs/tunings/new${of.runId ? `?from=${of.runId}` : of.recipeId ? `?recipe=${of.recipeId}` : ''}`,
  /** How a run was made: its log, and whether it comes out the same again. */
  runRecord: (projectId: string, runId: string) => `/projects/${projectId}/runs/${runId}/record`,
  compareRuns: (projectId: string, secondRunId?: string) =>
    `/projects/${projectId}/runs/compare${secondRunId ? `?second=${secondRunId}` : ''}`,
  postProcessing: (projectId: string, runId: string) => `/projects/${projectId}/runs/${runId}/post-processing`,
  run: (projectId: string, runId: string) => `/projects/${projectId}/runs/${runId}`,
  accuracy: (projectId: string, runId?: string) => `/projects/${projectId}/accuracy${runId ? `?run=${runId}` : ''}`,
  newDesign: (projectId: string, runId?: string) =>
    `/projects/${projectId}/accuracy/designs/new${runId ? `?run=${runId}` : ''}`,
  design: (projectId: string, designId: string) => `/projects/${projectId}/accuracy/designs/${designId}`,
  answerSheet: (projectId: string, designId: string) => `/projects/${projectId}/accuracy/designs/${designId}/sheet`,
  blindCheck: (projectId: string, designId: string) => `/projects/${projectId}/accuracy/designs/${designId}/check`,
  adjudication: (projectId: string, designId: string) => `/projects/${projectId}/accuracy/designs/${designId}/decide`,
  handover: (projectId: string) => `/projects/${projectId}/handover`,
  members: (projectId: string) => `/projects/${projectId}/members`,
} as const;

/** A path inside the product that may follow a sign-in; anything else becomes the project list. */
export function safeReturnPath(wanted: string | null): string {
  return wanted && /^\/(?![/\\])/.test(wanted) && !wanted.startsWith('/sign-in') ? wanted : paths.projects();
}
