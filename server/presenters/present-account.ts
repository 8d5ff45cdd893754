import type { Account, SiteAccount } from '../../shared/contracts/account.ts';
import type { Person } from '../../shared/contracts/common.ts';
import type { User } from '../entities/user.ts';
import type { SiteAccountRow } from '../services/accounts.ts';

export function presentAccount(user: User): Account {
  return {
    id: user.id,
    email: user.email,
    name: user.name,
    siteAdmin: user.siteAdmin,
    mailsRunEnd: user.mailsRunEnd,
    createdAt: user.createdAt.toISOString(),
  };
}

export function presentSiteAccount({ user, projectCount }: SiteAccountRow): SiteAccount {
  const state = user.closedAt ? 'closed' : user.passwordHash === null ? 'invited' : 'active';
  return { ...presentAccount(user), state, projectCount };
}

export function presentPerson(user: Pick<User, 'id' | 'name'> | null | undefined): Person | null {
  return user ? { id: user.id, name: user.name } : null;
}
