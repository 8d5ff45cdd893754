import { SMTPServer } from 'smtp-server';
import { simpleParser, type ParsedMail } from 'mailparser';
import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { projectEventSchema, type ProjectEvent } from '../../shared/contracts/job.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeSample } from '../factories/make-sample.ts';
import { PASSWORD } from '../factories/make-user.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const letters: ParsedMail[] = [];
const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS'],
  onData(stream, _session, done) {
    simpleParser(stream).then((letter) => {
      letters.push(letter);
      done();
    }, done);
  },
});

let test: TestApp;
let team: Team;
let ground: RunGround;

beforeAll(async () => {
  smtp.listen(0, '127.0.0.1');
  await once(smtp.server, 'listening');
  const { port } = smtp.server.address() as AddressInfo;
  test = await openTestApp({ smtpUrl: `smtp://127.0.0.1:${port}` });
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project, { trees: 60 });
});

afterAll(async () => {
  await test.close();
  await new Promise<void>((resolve) => smtp.close(() => resolve()));
});

async function signInByHand(): Promise<string> {
  const res = await fetch(`${test.url}/api/v1/session`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email: team.modeller.email, password: PASSWORD }),
  });
  expect(res.status).toBe(200);
  return res.headers.getSetCookie()[0]!.split(';')[0]!;
}

/** Reads a project's event stream until `isLast`. */
async function readEvents(cookie: string, isLast: (event: ProjectEvent) => boolean): Promise<ProjectEvent[]> {
  const stop = new AbortController();
  const res = await fetch(`${test.url}/api/v1/projects/${team.project.id}/events`, {
    headers: { cookie },
    signal: stop.signal,
  });
  const events: ProjectEvent[] = [];
  const reader = res.body!.pipeThrough(new TextDecoderStream()).getReader();
  let text = '';
  while (!events.some(isLast)) {
    const { value, done } = await reader.read();
    if (done) throw new Error('the event stream ended');
    const entries = (text + value).split('\n\n');
    text = entries.pop()!;
    for (const entry of entries) {
      const data = entry.split('\n').find((line) => line.startsWith('data: '));
      if (data) events.push(projectEventSchema.parse(JSON.parse(data.slice(6))));
    }
  }
  stop.abort();
  return events;
}

describe('while a run works', () => {
  it('the event stream tells its progress, rising, to the end, and a letter tells who started it', async () => {
    const cookie = await signInByHand();
    const listening = readEvents(
      cookie,
      (event) => event.type === 'job' && event.job.kind === 'run' && event.job.state === 'finished',
    );
    const agent = await test.signedIn(team.modeller);
    const { body } = await agent
      .post(`/api/v1/projects/${team.project.id}/runs`)
      .send({ name: 'With letter', recipe: ground.recipe })
      .expect(201);
    const run = await waitForRun(agent, (body as Run).id);
    const events = await listening;
    const jobs = events.flatMap((event) => (event.type === 'job' && event.runId === run.id ? [event.job] : []));
    const shares = jobs.map(({ share }) => share);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(jobs.at(-1)).toMatchObject({ state: 'finished', share: 1 });
    expect(jobs.some(({ state, total }) => state === 'running' && total > 0)).toBe(true);
    expect(events).toContainEqual({ type: 'changed', what: 'runs', id: run.id, by: team.modeller.id });

    expect(letters).toHaveLength(1);
    const [letter] = letters;
    expect(letter!.subject).toBe(`Run 1 (With letter) is finished – ${team.project.name}`);
    expect(letter!.to).toMatchObject({ text: team.modeller.email });
    expect(letter!.text).toContain(`/projects/${team.project.id}/runs/${run.id}`);
    expect(letter!.text).toContain(`${(run.overallAccuracy! * 100).toFixed(1)} % (95 % interval`);
  });

  it('a failure is told in words, leaves no file, and is mailed', async () => {
    // Whichever of the two is held out, it holds every pixel there would be to learn from.
    const rock = await makeClass(test.app, team.project, { name: 'Bare rock', code: 60 });
    for (let i = 0; i < 2; i++) await makeSample(test.app, ground.scene, rock, { column: 20, row: 60 });
    const agent = await test.signedIn(team.modeller);
    const recipe = { ...ground.recipe, classIds: [...ground.recipe.classIds, rock.id] };
    const { body } = await agent.post(`/api/v1/projects/${team.project.id}/runs`).send({ recipe }).expect(201);
    const failed = await waitForRun(agent, (body as Run).id);
    expect(failed.job.state).toBe('failed');
    expect(failed.job.error).toMatch(/^No training pixel is left of Bare rock/);
    expect(failed).toMatchObject({ classMapSha256: null, areas: null, overallAccuracy: null });
    expect(failed.notes.join(' ')).toContain('Bare rock has only 2 usable samples');
    expect(await test.app.files.list(`runs/${failed.id}/`)).toEqual([]);
    await agent.get(`/api/v1/runs/${failed.id}/accuracy`).expect(404);
    const letter = letters.at(-1)!;
    expect(letter.subject).toMatch(/^Run 2 failed/);
    expect(letter.text!.replace(/\s+/g, ' ')).toContain(failed.job.error);
  });
});
