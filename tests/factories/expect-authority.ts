import { expect } from 'vitest';
import type { Team } from './make-project.ts';
import type { Agent, TestApp } from './test-app.ts';

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';
type Person = Exclude<keyof Team, 'project'>;

export interface RouteUse {
  method: Method;
  /** Below /api/v1. */
  path: string;
  body?: object;
}

const agents = new WeakMap<TestApp, Map<string, Promise<Agent>>>();

/** A signed-in browser, one for each person of a test file. */
export function browserOf(test: TestApp, user: { email: string }): Promise<Agent> {
  const known = agents.get(test) ?? new Map<string, Promise<Agent>>();
  agents.set(test, known);
  const agent = known.get(user.email) ?? test.signedIn(user);
  known.set(user.email, agent);
  return agent;
}

/** Sends a request as a person of the team, or signed out. */
export async function send(test: TestApp, user: { email: string } | null, { method, path, body }: RouteUse) {
  const agent = user ? await browserOf(test, user) : test.stranger;
  const request = agent[method](`/api/v1${path}`);
  return body === undefined ? request : request.send(body);
}

/**
 * Checks who is turned away: 401 signed out, 404 for the outsider and for those named in `hidden`, 403 for those in `forbidden`.
 */
export async function expectTurnedAway(
  test: TestApp,
  team: Team,
  use: RouteUse,
  { forbidden = [], hidden = ['client'] }: { forbidden?: Person[]; hidden?: Person[] },
): Promise<void> {
  const statusOf = async (person: Person | null) => (await send(test, person && team[person], use)).status;
  expect(await statusOf(null), 'signed out').toBe(401);
  for (const person of ['outsider' as const, ...hidden]) expect(await statusOf(person), person).toBe(404);
  for (const person of forbidden) expect(await statusOf(person), person).toBe(403);
}
