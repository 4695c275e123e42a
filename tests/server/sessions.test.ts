import jwt from 'jsonwebtoken';
import supertest from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';

let server: TestServer;
const password = 'a long enough password';
const email = 'engineer@test.example';

beforeAll(async () => {
  server = await startTestServer();
  const { link } = await server.services.people.newLink(server.people.engineer.id, server.people.admin.id);
  await server.services.passwords.setByLink(link.split('/').at(-1)!, password);
  await server.db('sessions').update({ revoked_at: null }); // a new password ends all sessions
});
beforeEach(() => {
  server.clock.now = new Date();
});
afterAll(() => server.stop());

const post = (path: string, body?: object) => supertest(server.app).post(`/api/v1${path}`).send(body);
const signIn = () => post('/session', { email, password }).expect(200);
const cookieOf = (response: supertest.Response): string => response.get('Set-Cookie')![0]!;
const refresh = (cookie: string) => post('/session/refresh').set('Cookie', cookie.split(';')[0]!);
const whoIs = (token: string) => supertest(server.app).get('/api/v1/session').set('Authorization', `Bearer ${token}`);

const after = (ms: number) => {
  server.clock.now = new Date(server.clock.now.getTime() + ms);
};

describe('sign-in', () => {
  it('gives an access token of ten minutes and the person', async () => {
    const { body } = await signIn();
    expect(body).toMatchObject({ expiresIn: 600, user: { email, name: 'The engineer', role: 'engineer' } });
    const { exp, iat } = jwt.decode(body.accessToken as string) as { exp: number; iat: number };
    expect(exp - iat).toBe(600);
  });

  it('takes the address in any case of letters', async () => {
    await post('/session', { email: 'Engineer@TEST.example', password }).expect(200);
  });

  it('keeps the refresh token in a cookie that scripts and other sites do not get', async () => {
    const cookie = cookieOf(await signIn());
    expect(cookie).toMatch(/; Path=\/api\/v1\/session; .*HttpOnly; SameSite=Strict$/);
    expect(cookie).not.toMatch(/Secure/);
  });

  it('stores neither the token nor the password', async () => {
    const token = cookieOf(await signIn()).split(/[=;]/)[1]!;
    const rows = JSON.stringify([await server.db('refresh_tokens'), await server.db('people')]);
    expect(rows).not.toContain(token);
    expect(rows).not.toContain(password);
    expect(rows).toContain('$argon2id$v=19$m=19456,t=2,p=1$');
  });

  it('says the same of a wrong password, of nobody and of a person without a password', async () => {
    const answers = await Promise.all([
      post('/session', { email, password: 'wrong' }),
      post('/session', { email: 'nobody@test.example', password }),
      post('/session', { email: 'viewer@test.example', password }),
    ]);
    for (const { status, body } of answers) expect({ status, body }).toEqual({ status: 401, body: answers[0].body });
  });

  it('refuses a person whose access was taken away, at once', async () => {
    const { body } = await signIn();
    await server.db('people').where({ email }).update({ active: 0 });
    await whoIs(body.accessToken as string).expect(401);
    await post('/session', { email, password }).expect(401);
    await server.db('people').where({ email }).update({ active: 1 });
  });

  it('stops guessing at one address after ten failures, and nobody else', async () => {
    const guess = () => post('/session', { email: 'tester@test.example', password: 'guess' });
    for (let attempt = 0; attempt < 10; attempt += 1) await guess().expect(401);
    const { body } = await guess()
      .expect(429)
      .expect('Content-Type', /problem\+json/);
    expect(body).toMatchObject({ type: '/problems/too-many', status: 429 });
    await signIn();
  });
});

describe('an access token', () => {
  it.each([
    ['of another secret', (claims: object) => jwt.sign(claims, 'x'.repeat(40), { audience: 'keepstep-api' })],
    ['without a signature', (claims: object) => jwt.sign(claims, '', { algorithm: 'none', audience: 'keepstep-api' })],
    ['that is no token', () => 'nonsense'],
  ])('%s opens nothing', async (_, forge) => {
    const { id, sessionId } = server.people.engineer;
    await whoIs(forge({ sub: String(id), sid: sessionId })).expect(401);
  });

  it('expires', async () => {
    server.clock.now = new Date(Date.now() - 601_000);
    const { body } = await signIn();
    await whoIs(body.accessToken as string).expect(401);
  });

  it('ends with its session', async () => {
    const { body } = await signIn();
    const authorization = `Bearer ${body.accessToken}`;
    await supertest(server.app).delete('/api/v1/session').set('Authorization', authorization).expect(204);
    await whoIs(body.accessToken as string).expect(401);
  });
});

describe('refresh', () => {
  it('trades a token for the next one', async () => {
    const first = cookieOf(await signIn());
    const answer = await refresh(first).expect(200);
    expect(cookieOf(answer)).not.toBe(first);
    await whoIs(answer.body.accessToken as string).expect(200);
    await refresh(cookieOf(answer)).expect(200);
  });

  it('lets two tabs that renew at once both go on', async () => {
    const cookie = cookieOf(await signIn());
    const [one, other] = await Promise.all([refresh(cookie), refresh(cookie)]);
    expect([one.status, other.status]).toEqual([200, 200]);
    await refresh(cookieOf(one)).expect(200);
    await refresh(cookieOf(other)).expect(200);
  });

  it('ends the whole family when a token comes back after the grace', async () => {
    const stolen = cookieOf(await signIn());
    const kept = await refresh(stolen).expect(200);
    after(10_001);
    const refused = await refresh(stolen).expect(401);
    expect(cookieOf(refused)).toMatch(/^keepstep_refresh=;/);
    await refresh(cookieOf(kept)).expect(401);
    await whoIs(kept.body.accessToken as string).expect(401);
  });

  it.each(['keepstep_refresh=unknown', 'other=1', 'keepstep_refresh=j%3A%5B%5D'])('refuses %s', async (cookie) => {
    await refresh(cookie).expect(401);
  });

  it('ends a session that was not used for two weeks', async () => {
    const cookie = cookieOf(await signIn());
    after(14 * 24 * 3_600_000 + 1);
    await refresh(cookie).expect(401);
  });

  it('is over after signing out', async () => {
    const cookie = cookieOf(await signIn());
    const signOut = supertest(server.app).delete('/api/v1/session').set('Cookie', cookie.split(';')[0]!);
    expect(cookieOf(await signOut.expect(204))).toMatch(/^keepstep_refresh=;/);
    await refresh(cookie).expect(401);
  });
});

describe('the own sessions', () => {
  it('are listed with the current one marked, and can be ended one by one', async () => {
    const { body } = await signIn();
    const own = server.as('engineer');
    const { items } = (await own.get('/sessions').expect(200)).body as { items: { id: number; current: boolean }[] };
    expect(items.filter(({ current }) => current)).toHaveLength(1);
    const newest = Math.max(...items.map(({ id }) => id));
    await own.delete(`/sessions/${newest}`).expect(204);
    await whoIs(body.accessToken as string).expect(401);
    await own.delete(`/sessions/${newest}`).expect(404);
  });

  it('are nobody else’s to end', async () => {
    await server.as('viewer').delete(`/sessions/${server.people.engineer.sessionId}`).expect(404);
  });
});

describe('the own password', () => {
  it('is changed by who knows it; the other sessions end', async () => {
    const mine = (await signIn()).body.accessToken as string;
    const other = (await signIn()).body.accessToken as string;
    const change = (body: object) =>
      supertest(server.app).put('/api/v1/session/password').set('Authorization', `Bearer ${mine}`).send(body);
    const refused = await change({ current: 'wrong', password: 'another long password' }).expect(422);
    expect(refused.body.faults).toEqual([{ pointer: '/current', detail: 'is not your password' }]);
    await change({ current: password, password: 'short' }).expect(422);
    await change({ current: password, password: 'another long password' }).expect(204);
    await whoIs(mine).expect(200);
    await whoIs(other).expect(401);
    await change({ current: 'another long password', password }).expect(204);
  });
});
