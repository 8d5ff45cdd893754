/** Every address of the product, in one place. Ids are UUIDs, so they need no escaping; tokens are escaped. */
export const paths = {
  home: () => '/',
  signIn: (backTo?: string) => (backTo ? `/sign-in?to=${encodeURIComponent(backTo)}` : '/sign-in'),
  forgotPassword: () => '/forgot-password',
  welcome: (token: string) => `/welcome/${encodeURIComponent(token)}`,
  projects: () => '/projects',
  account: () => '/account',
  siteAccounts: () => '/site/accounts',
  project: (projectId: string) => `/projects/${projectId}`,
  overview: (projectId: string) => `/projects/${projectId}/overview`,
  scenes: (projectId: string) => `/projects/${projectId}/scenes`,
  scene: (projectId: string, sceneId: string) => `/projects/${projectId}/scenes/${sceneId}`,
  classes: (projectId: string) => `/projects/${projectId}/classes`,
  samples: (projectId: string) => `/projects/${projectId}/samples`,
  runs: (projectId: string) => `/projects/${projectId}/runs`,
  run: (projectId: string, runId: string) => `/projects/${projectId}/runs/${runId}`,
  accuracy: (projectId: string) => `/projects/${projectId}/accuracy`,
  handover: (projectId: string) => `/projects/${projectId}/handover`,
  members: (projectId: string) => `/projects/${projectId}/members`,
} as const;

/** A path inside the product that may follow a sign-in; anything else becomes the project list. */
export function safeReturnPath(wanted: string | null): string {
  return wanted && /^\/(?![/\\])/.test(wanted) && !wanted.startsWith('/sign-in') ? wanted : paths.projects();
}
