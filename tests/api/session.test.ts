import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Session } from '../../server/entities/session.ts';
import { User } from '../../server/entities/user.ts';
import { makeUser, PASSWORD } from '../factories/make-user.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';

interface Letter {
  to: string;
  subject: string;
  text: string;
}

const letters: Letter[] = [];
const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS'],
  onData(stream, session, done) {
    simpleParser(stream).then(
      (mail) => {
        letters.push({
          to: session.envelope.rcptTo[0]?.address ?? '',
          subject: mail.subject ?? '',
          text: mail.text ?? '',
        });
        done();
      },
      (error: Error) => done(error),
    );
  },
});
let test: TestApp;

beforeAll(async () => {
  await new Promise<void>((resolve) => smtp.listen(0, '127.0.0.1', () => resolve()));
  const { port } = smtp.server.address() as AddressInfo;
  test = await openTestApp({ smtpUrl: `smtp://127.0.0.1:${port}` });
});
afterAll(async () => {
  await test.close();
  await new Promise<void>((resolve) => smtp.close(() => resolve()));
});

const signIn = (email: string, password: string) => test.stranger.post('/api/v1/session').send({ email, password });
const linkIn = (letter: Letter | undefined) => /\/welcome\/(\S+)/.exec(letter?.text ?? '')?.[1] ?? '';
/** The answer to a forgotten password does not wait for the letter. */
async function linkTo({ email }: { email: string }): Promise<string> {
  await expect.poll(() => letters.some(({ to }) => to === email)).toBe(true);
  return linkIn(letters.findLast(({ to }) => to === email));
}

describe('signing in', () => {
  it('opens a session in an http-only, same-site cookie and tells who is signed in', async () => {
    const user = await makeUser(test.app);
    const answer = await signIn(`  ${user.email.toUpperCase()} `, PASSWORD).expect(200);
    expect(answer.body.account).toMatchObject({ id: user.id, email: user.email, siteAdmin: false });
    expect(answer.headers['set-cookie']?.[0]).toMatch(/^groundsel\.sid=.*HttpOnly.*SameSite=Lax/i);
    const agent = await test.signedIn(user);
    expect((await agent.get('/api/v1/session')).body.account.email).toBe(user.email);
  });

  it('says the same for a wrong password as for an unknown e-mail', async () => {
    const user = await makeUser(test.app);
    const wrong = await signIn(user.email, 'not the password').expect(401);
    const unknown = await signIn('nobody@vennory.example', 'not the password').expect(401);
    expect(wrong.body).toEqual(unknown.body);
  });

  it('keeps only an Argon2id hash of the password', async () => {
    const user = await makeUser(test.app);
    expect(user.passwordHash).toMatch(/^\$argon2id\$v=19\$m=65536,t=3,p=2\$/);
  });

  it('lets nobody in whose account is closed, and ends their sessions', async () => {
    const admin = await makeUser(test.app, { siteAdmin: true });
    const user = await makeUser(test.app);
    const agent = await test.signedIn(user);
    await (await test.signedIn(admin)).patch(`/api/v1/site/accounts/${user.id}`).send({ closed: true }).expect(200);
    expect((await agent.get('/api/v1/session')).body.account).toBeNull();
    await agent.get('/api/v1/projects').expect(401);
    await signIn(user.email, PASSWORD).expect(401);
  });

  it('changes the session id at sign-in, so that a planted one is worth nothing', async () => {
    const user = await makeUser(test.app);
    const agent = await test.signedIn(user);
    const before = await test.app.db.getRepository(Session).findBy({ userId: user.id });
    await agent.post('/api/v1/session').send({ email: user.email, password: PASSWORD }).expect(200);
    const after = await test.app.db.getRepository(Session).findBy({ userId: user.id });
    expect(after.map(({ id }) => id)).not.toEqual(before.map(({ id }) => id));
  });

  it('stops after eight wrong passwords for one account, also with the right one, and says how long to wait', async () => {
    const user = await makeUser(test.app);
    for (let i = 0; i < 8; i++) await signIn(user.email, 'wrong').expect(401);
    const stopped = await signIn(user.email, PASSWORD).expect(429);
    expect(stopped.body).toMatchObject({ code: 'too-many-requests', status: 429 });
    expect(Number(stopped.headers['retry-after'])).toBeGreaterThan(60);
    const other = await makeUser(test.app);
    await signIn(other.email, PASSWORD).expect(200);
  });
});

describe('requests from other sites', () => {
  it('are refused when they would change something', async () => {
    const agent = await test.signedIn(await makeUser(test.app));
    const body = { name: 'Planted' };
    await agent.post('/api/v1/projects').set('Origin', 'https://elsewhere.example').send(body).expect(403);
    await agent.post('/api/v1/projects').set('Sec-Fetch-Site', 'cross-site').send(body).expect(403);
    await agent.post('/api/v1/projects').set('Sec-Fetch-Site', 'same-site').send(body).expect(403);
    await agent.post('/api/v1/projects').set('Origin', test.url).send(body).expect(201);
  });

  it('are refused when they are no JSON', async () => {
    const agent = await test.signedIn(await makeUser(test.app));
    await agent.post('/api/v1/projects').set('Content-Type', 'text/plain').send('{"name":"Planted"}').expect(400);
    await agent.post('/api/v1/projects').set('Content-Type', 'application/json').send('{"name":').expect(400);
  });
});

describe('signing out', () => {
  it('ends this browser only', async () => {
    const user = await makeUser(test.app);
    const [here, there] = [await test.signedIn(user), await test.signedIn(user)];
    await here.delete('/api/v1/session').expect(204);
    await here.get('/api/v1/projects').expect(401);
    await there.get('/api/v1/projects').expect(200);
  });

  it('ends all browsers when asked to', async () => {
    const user = await makeUser(test.app);
    const [here, there] = [await test.signedIn(user), await test.signedIn(user)];
    const { devices } = (await here.get('/api/v1/account/devices').expect(200)).body;
    expect(devices).toHaveLength(2);
    expect(devices.filter(({ current }: { current: boolean }) => current)).toHaveLength(1);
    await here.delete('/api/v1/account/devices').expect(204);
    await here.get('/api/v1/projects').expect(401);
    await there.get('/api/v1/projects').expect(401);
  });
});

describe('passwords', () => {
  it('are changed with the present one, which signs other browsers out and mails a warning', async () => {
    const user = await makeUser(test.app);
    const [here, there] = [await test.signedIn(user), await test.signedIn(user)];
    const next = 'a longer and better one';
    await here.put('/api/v1/account/password').send({ current: 'wrong', next }).expect(400);
    await here.put('/api/v1/account/password').send({ current: PASSWORD, next: 'short' }).expect(400);
    await here.put('/api/v1/account/password').send({ current: PASSWORD, next }).expect(204);
    await here.get('/api/v1/projects').expect(200);
    await there.get('/api/v1/projects').expect(401);
    await signIn(user.email, PASSWORD).expect(401);
    await signIn(user.email, next).expect(200);
    expect(letters.find(({ to }) => to === user.email)?.subject).toMatch(/password was changed/);
  });

  it('that were forgotten are chosen anew through a mailed link, once', async () => {
    const user = await makeUser(test.app);
    const known = await test.stranger.post('/api/v1/account/forgotten').send({ email: user.email }).expect(202);
    const unknown = await test.stranger
      .post('/api/v1/account/forgotten')
      .send({ email: 'nobody@vennory.example' })
      .expect(202);
    expect(known.body).toEqual(unknown.body);
    const secret = await linkTo(user);
    expect((await test.stranger.get(`/api/v1/welcome/${secret}`).expect(200)).body).toMatchObject({
      purpose: 'reset',
      email: user.email,
    });
    const choice = { name: user.name, password: 'chosen after forgetting' };
    await test.stranger
      .post(`/api/v1/welcome/${secret}`)
      .send({ ...choice, password: 'short' })
      .expect(400);
    const accepted = await test.stranger.post(`/api/v1/welcome/${secret}`).send(choice).expect(200);
    expect(accepted.body.account.id).toBe(user.id);
    await test.stranger.post(`/api/v1/welcome/${secret}`).send(choice).expect(404);
    await signIn(user.email, choice.password).expect(200);
  });

  it('work once, even for two who hold the same link at once', async () => {
    const user = await makeUser(test.app);
    await test.stranger.post('/api/v1/account/forgotten').send({ email: user.email }).expect(202);
    const secret = await linkTo(user);
    const answers = await Promise.all(
      ['first', 'second'].map((who) =>
        test.stranger.post(`/api/v1/welcome/${secret}`).send({ name: who, password: `the password of the ${who}` }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 404]);
  });

  it('to a new password stop working when the password is changed', async () => {
    const user = await makeUser(test.app);
    await test.stranger.post('/api/v1/account/forgotten').send({ email: user.email }).expect(202);
    const secret = await linkTo(user);
    await test.stranger.get(`/api/v1/welcome/${secret}`).expect(200);
    const agent = await test.signedIn(user);
    await agent.put('/api/v1/account/password').send({ current: PASSWORD, next: 'quite another password' }).expect(204);
    await test.stranger.get(`/api/v1/welcome/${secret}`).expect(404);
  });

  it('are never stored beside the link: only its digest is', async () => {
    const user = await makeUser(test.app);
    await test.stranger.post('/api/v1/account/forgotten').send({ email: user.email }).expect(202);
    const secret = await linkTo(user);
    const rows = await test.app.db.query('SELECT * FROM account_tokens');
    expect(secret.length).toBeGreaterThan(30);
    expect(JSON.stringify(rows)).not.toContain(secret);
  });
});

describe('the present password', () => {
  it('cannot be guessed at a browser that was left signed in', async () => {
    const user = await makeUser(test.app);
    const agent = await test.signedIn(user);
    const guess = (current: string) =>
      agent.put('/api/v1/account/password').send({ current, next: 'quite another password' });
    for (let n = 0; n < 8; n++) await guess(`guess ${n}`).expect(400);
    await guess(PASSWORD).expect(429);
  });
});

describe('accounts of the site', () => {
  it('are made by a site administrator, who gets a mailed welcome link out', async () => {
    const agent = await test.signedIn(await makeUser(test.app, { siteAdmin: true }));
    const email = 'newcomer@vennory.example';
    const made = await agent.post('/api/v1/site/accounts').send({ email, name: 'Newcomer' }).expect(201);
    expect(made.body).toMatchObject({ mailed: true, link: null, account: { state: 'invited', projectCount: 0 } });
    await agent.post('/api/v1/site/accounts').send({ email, name: 'Again' }).expect(409);
    await agent.post('/api/v1/site/accounts').send({ email: 'no address', name: '' }).expect(400);
    const secret = linkIn(letters.findLast(({ to }) => to === email));
    await test.stranger
      .post(`/api/v1/welcome/${secret}`)
      .send({ name: 'New Comer', password: 'a fresh password' })
      .expect(200);
    const listed = (await agent.get('/api/v1/site/accounts').expect(200)).body.accounts;
    expect(listed.find((account: { email: string }) => account.email === email)).toMatchObject({
      state: 'active',
      name: 'New Comer',
    });
    await agent.post(`/api/v1/site/accounts/${made.body.account.id}/link`).expect(200);
    expect(letters.findLast(({ to }) => to === email)?.subject).toMatch(/new Groundsel password/);
  });

  it('always keep one open administrator', async () => {
    const users = test.app.db.getRepository(User);
    await users.update({ siteAdmin: true }, { siteAdmin: false });
    const admin = await makeUser(test.app, { siteAdmin: true });
    const agent = await test.signedIn(admin);
    await agent.patch(`/api/v1/site/accounts/${admin.id}`).send({ siteAdmin: false }).expect(409);
    await agent.patch(`/api/v1/site/accounts/${admin.id}`).send({ closed: true }).expect(409);
    const second = await makeUser(test.app);
    await agent.patch(`/api/v1/site/accounts/${second.id}`).send({ siteAdmin: true }).expect(200);
    await agent.patch(`/api/v1/site/accounts/${admin.id}`).send({ siteAdmin: false }).expect(200);
    await agent.get('/api/v1/site/accounts').expect(404);
  });

  it('tell the administrator what the stored files take', async () => {
    const agent = await test.signedIn(await makeUser(test.app, { siteAdmin: true }));
    const { body } = await agent.get('/api/v1/site/storage').expect(200);
    expect(body.freeBytes).toBeGreaterThan(0);
    expect(body.sceneBytes).toBe(0);
  });
});
