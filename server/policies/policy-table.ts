import type { ProjectRole } from '../../shared/constants/roles.ts';

const ALL: readonly ProjectRole[] = ['lead', 'labeller', 'modeller', 'reviewer', 'client'];
const TEAM: readonly ProjectRole[] = ['lead', 'labeller', 'modeller', 'reviewer'];

interface Rule {
  /** Roles that may. */
  allow: readonly ProjectRole[];
  /** Roles that may only with what they made themselves. */
  own?: readonly ProjectRole[];
  /** Roles that may know the thing exists; to all others it is not there. */
  see: readonly ProjectRole[];
}

/** Who may do what in a project. The only place where authority is written down. */
export const POLICY = {
  'project.read': { allow: ALL, see: ALL },
  'project.manage': { allow: ['lead'], see: ALL },
  'overview.read': { allow: TEAM, see: TEAM },
  'member.read': { allow: TEAM, see: TEAM },
  'member.manage': { allow: ['lead'], see: TEAM },
  'scene.read': { allow: TEAM, see: TEAM },
  'scene.manage': { allow: ['lead', 'modeller'], see: TEAM },
  'study-area.set': { allow: ['lead'], see: TEAM },
  'class.read': { allow: TEAM, see: TEAM },
  'class.manage': { allow: ['lead'], see: TEAM },
  'sample.read': { allow: TEAM, see: TEAM },
  'sample.draw': { allow: ['lead', 'labeller'], see: TEAM },
  'sample.edit': { allow: ['lead'], own: ['labeller'], see: TEAM },
  'sample.review': { allow: ['lead'], see: TEAM },
  'sample.remark': { allow: TEAM, see: TEAM },
  'block.read': { allow: TEAM, see: TEAM },
  'block.manage': { allow: ['lead'], see: TEAM },
  'block.work': { allow: ['lead', 'labeller'], see: TEAM },
  'run.read': { allow: TEAM, see: TEAM },
  'run.start': { allow: ['lead', 'modeller'], see: TEAM },
  'run.stop': { allow: ['lead', 'modeller'], see: TEAM },
  'accuracy.read': { allow: ['lead', 'modeller', 'reviewer'], see: TEAM },
  'design.read': { allow: ['lead', 'modeller', 'reviewer'], see: TEAM },
  'design.plan': { allow: ['lead', 'reviewer'], see: TEAM },
  'design.interpret': { allow: ['reviewer'], see: TEAM },
  'design.adjudicate': { allow: ['reviewer'], see: TEAM },
  'design.estimates': { allow: ['lead', 'modeller', 'reviewer'], see: TEAM },
} as const satisfies Record<string, Rule>;

export type Action = keyof typeof POLICY;
export type Decision = 'allow' | 'forbid' | 'hide';

/**
 * Decides an action for someone who holds `roles` in the project (none: no member).
 * `own` says whether the viewer made the thing acted on.
 */
export function decide(action: Action, roles: readonly ProjectRole[], own = false): Decision {
  const rule: Rule = POLICY[action];
  if (roles.some((role) => rule.allow.includes(role))) return 'allow';
  if (own && roles.some((role) => rule.own?.includes(role))) return 'allow';
  return roles.some((role) => rule.see.includes(role)) ? 'forbid' : 'hide';
}

/** Whether an action is allowed; for presenters, which send abilities along. */
export function can(action: Action, roles: readonly ProjectRole[], own = false): boolean {
  return decide(action, roles, own) === 'allow';
}
