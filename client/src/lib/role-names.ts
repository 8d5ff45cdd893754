import { PROJECT_ROLES, type ProjectRole, ROLE_TEXT } from '../../../shared/constants/roles.ts';

/** Roles in words, in the product's order: "Lead, Reviewer". */
export function roleNames(roles: readonly ProjectRole[]): string {
  return PROJECT_ROLES.filter((role) => roles.includes(role))
    .map((role) => ROLE_TEXT[role].name)
    .join(', ');
}
