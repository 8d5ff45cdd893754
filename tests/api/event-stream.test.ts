import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { EventEntry } from '../../server/entities/event-entry.ts';
import { Membership } from '../../server/entities/membership.ts';
import type { User } from '../../server/entities/user.ts';
import { endAllSessions } from '../../server/services/accounts.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { PASSWORD } from '../factories/make-user.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let lead: Agent;

beforeAll(async () => {
  test = await openTestApp();
});
afterAll(() => test.close());
beforeEach(async () => {
  team = await makeTeam(test.app);
  lead = await test.signedIn(team.lead);
});

interface Listener {
  /** All that came so far. */
  text(): string;
  hasEnded(): boolean;
  leave(): Promise<void>;
}

/** A browser of its own that listens to the team's project. */
async function listen(user: User, headers: Record<string, string> = {}): Promise<Listener> {
  const signedIn = await test.stranger.post('/api/v1/session').send({ email: user.email, password: PASSWORD });
  const cookie = signedIn.headers['set-cookie']?.[0]?.split(';')[0] ?? '';
  const abort = new AbortController();
  const answer = await fetch(`${test.url}/api/v1/projects/${team.project.id}/events`, {
    headers: { cookie, ...headers },
    signal: abort.signal,
  });
  expect(answer.status).toBe(200);
  let text = '';
  let hasEnded = false;
  const reading = (async () => {
    for await (const chunk of answer.body as unknown as AsyncIterable<Uint8Array>)
      text += new TextDecoder().decode(chunk);
    hasEnded = true;
  })().catch((error: unknown) => {
    if (!abort.signal.aborted) throw error;
  });
  return {
    text: () => text,
    hasEnded: () => hasEnded,
    async leave() {
      abort.abort();
      await reading;
    },
  };
}

async function rename(name: string): Promise<void> {
  const path = `/api/v1/projects/${team.project.id}`;
  const { version } = (await lead.get(path)).body as { version: number };
  await lead.patch(path).send({ version, name }).expect(200);
}

async function memberIdOf(user: User): Promise<string> {
  const row = await test.app.db
    .getRepository(Membership)
    .findOneByOrFail({ projectId: team.project.id, userId: user.id });
  return row.id;
}

describe('the time a change takes', () => {
  it('is under a second from the answer to whoever made it until another browser hears of it', async () => {
    const listener = await listen(team.labeller);
    await rename('Renamed while somebody listens');
    const answeredAt = performance.now();
    while (!listener.text().includes('"what":"project"')) {
      if (performance.now() - answeredAt > 5_000) throw new Error('the event did not come');
      await new Promise((resolve) => setTimeout(resolve, 10));
    }
    expect(performance.now() - answeredAt).toBeLessThan(1_000);
    await listener.leave();
  });
});

describe('an open event stream', () => {
  it('ends for a member who is taken out, before the next word of the project, and goes on for the others', async () => {
    const gone = await listen(team.labeller);
    const stays = await listen(team.reviewer);
    await rename('Heard by both');
    await expect.poll(() => gone.text()).toContain('"what":"project"');
    const heard = gone.text();

    await lead.delete(`/api/v1/projects/${team.project.id}/members/${await memberIdOf(team.labeller)}`).expect(204);
    await rename('Heard by one');
    await expect.poll(() => gone.hasEnded()).toBe(true);
    expect(gone.text()).toBe(heard);
    await expect.poll(() => stays.text().split('"what":"project"').length).toBe(3);
    expect(stays.hasEnded()).toBe(false);
    await stays.leave();
  });

  it('ends for a member whose roles no longer allow it', async () => {
    const stream = await listen(team.labeller);
    await lead
      .patch(`/api/v1/projects/${team.project.id}/members/${await memberIdOf(team.labeller)}`)
      .send({ roles: ['client'] })
      .expect(200);
    await expect.poll(() => stream.hasEnded()).toBe(true);
    expect(stream.text()).not.toContain('data:');
  });

  it('ends within seconds when its session is ended', { timeout: 30_000 }, async () => {
    const stream = await listen(team.labeller);
    await endAllSessions(test.app, team.labeller.id);
    await expect.poll(() => stream.hasEnded(), { timeout: 20_000, interval: 200 }).toBe(true);
  });

  it('lets go of its listener when the browser leaves, even while what it missed is read', async () => {
    const listeners = () => (test.app.events as unknown as { listeners: Map<string, Set<unknown>> }).listeners;
    await test.app.events.publish(team.project.id, { type: 'changed', what: 'samples', id: null, by: null });
    const { id } = await test.app.db.getRepository(EventEntry).findOneByOrFail({ projectId: team.project.id });
    const streams = await Promise.all(
      Array.from({ length: 5 }, () => listen(team.modeller, { 'Last-Event-ID': String(Number(id) - 1) })),
    );
    await Promise.all(streams.map((stream) => stream.leave()));
    await expect.poll(() => listeners().has(team.project.id)).toBe(false);
  });
});
