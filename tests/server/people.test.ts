import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

const invite = (email: string) => server.as('admin').post('/people', { email, name: 'Ada Prim', role: 'tester' });
const tokenOf = (link: string): string => link.split('/').at(-1)!;
const setPassword = (token: string, password = 'twelve letters') => server.as().post('/password', { token, password });

describe('an invitation', () => {
  it('shows a link once, by which the person sets a password and signs in', async () => {
    const { body } = await invite('Ada@test.example').expect(201);
    expect(body.person).toMatchObject({ email: 'ada@test.example', hasPassword: false, active: true, version: 1 });
    expect(body.link).toMatch(/^http:\/\/keepstep\.example\/password\/[\w-]{43}$/);
    const token = tokenOf(body.link as string);
    const owner = await server.as().post('/password-links/check', { token }).expect(200);
    expect(owner.body).toEqual({ email: 'ada@test.example', name: 'Ada Prim' });
    await setPassword(token).expect(204);
    await setPassword(token).expect(404);
    await server.as().post('/session', { email: 'ada@test.example', password: 'twelve letters' }).expect(200);
  });

  it('stores the hash of the token only', async () => {
    const { body } = await invite('hash@test.example').expect(201);
    expect(JSON.stringify(await server.db('password_links'))).not.toContain(tokenOf(body.link as string));
  });

  it('is refused for an address that is taken', async () => {
    await invite('twice@test.example').expect(201);
    await invite('TWICE@test.example').expect(409);
  });

  it('ends after three days, and when a newer link is made', async () => {
    const { body } = await invite('late@test.example').expect(201);
    const newer = await server.as('admin').post(`/people/${body.person.id}/links`).expect(201);
    await setPassword(tokenOf(body.link as string)).expect(404);
    const now = server.clock.now;
    server.clock.now = new Date(now.getTime() + 72 * 3_600_000 + 1);
    const late = supertest(server.app)
      .post('/api/v1/password')
      .send({ token: tokenOf(newer.body.link as string), password: 'twelve letters' });
    await late.expect(404);
    server.clock.now = now;
    await setPassword(tokenOf(newer.body.link as string)).expect(204);
  });

  it('needs twelve characters for a password', async () => {
    const { body } = await invite('short@test.example').expect(201);
    const refused = await setPassword(tokenOf(body.link as string), 'elevenchars').expect(422);
    expect(refused.body.faults).toEqual([{ pointer: '/password', detail: 'must have at least 12 characters' }]);
  });
});

describe('a change', () => {
  const change = (id: number, body: object, version: number) =>
    server.as('admin').patch(`/people/${id}`, body).set('If-Match', `"${version}"`);

  it('takes effect on the next request of the person', async () => {
    const { id } = server.people.viewer;
    const changed = await change(id, { role: 'engineer' }, 1).expect(200).expect('ETag', '"2"');
    expect(changed.body).toMatchObject({ role: 'engineer', version: 2 });
    await server
      .as('viewer')
      .get('/session')
      .expect(200, { user: { ...pick(changed.body as object) } });
    await change(id, { role: 'viewer' }, 2).expect(200);
  });

  it('signs out whose access it takes', async () => {
    const { id } = server.people.tester;
    await change(id, { active: false }, 1).expect(200);
    await server.as('tester').get('/session').expect(401);
  });

  it('needs the version that was read', async () => {
    const { id } = server.people.release;
    await server.as('admin').patch(`/people/${id}`, { name: 'New' }).expect(428);
    await change(id, { name: 'New' }, 9).expect(412);
  });

  it('leaves one admin', async () => {
    const { id } = server.people.admin;
    await change(id, { role: 'viewer' }, 1).expect(409);
    await change(id, { active: false }, 1).expect(409);
    await change(id, { name: 'Still admin' }, 1).expect(200);
  });

  it('never leaves none, when two admins remove each other at once', async () => {
    const { body } = await server.as('admin').post('/people', { email: 'b@test.example', name: 'B', role: 'admin' });
    const other = body.person.id as number;
    const own = server.people.admin.id;
    const [one, two] = await Promise.all([change(other, { active: false }, 1), change(own, { active: false }, 2)]);
    expect([one.status, two.status].sort()).not.toEqual([200, 200]);
    const left = await server.db('people').where({ role: 'admin', active: 1 }).select('id');
    expect(left.length).toBeGreaterThan(0);
    await server.db('people').where({ id: own }).update({ active: 1 });
    await server.db('sessions').where({ person_id: own }).update({ revoked_at: null });
  });
});

describe('the audit trail', () => {
  it('names who did what, newest first, in pages', async () => {
    const first = await server.as('admin').get('/audit?limit=3').expect(200);
    expect(first.body.items).toHaveLength(3);
    const second = await server.as('admin').get(`/audit?limit=3&cursor=${first.body.next}`).expect(200);
    const ids = [...first.body.items, ...second.body.items].map(({ id }: { id: number }) => id);
    expect(ids).toEqual([...ids].sort((a, b) => b - a));
    expect(new Set(ids).size).toBe(6);
    const invited = await server.db('audit').where({ action: 'person.invite' });
    expect(invited.length).toBeGreaterThan(4);
  });

  it('cannot be changed or shortened by the application’s user', async () => {
    await expect(server.db('audit').update({ subject: 'x' })).rejects.toMatchObject({ sqlState: '45000' });
    await expect(server.db('audit').delete()).rejects.toMatchObject({ sqlState: '45000' });
  });
});

function pick(person: object) {
  const { id, email, name, role } = person as { id: number; email: string; name: string; role: string };
  return { id, email, name, role };
}
