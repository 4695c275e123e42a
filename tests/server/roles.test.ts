import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { apiRoutes } from '../../server/routes/index';
import { roles, type Role } from '../../server/roles';
import { startTestServer, type Client, type TestServer } from '../support/test-server';

const all = [...roles];
const engineer: Role[] = ['engineer'];
const testers: Role[] = ['engineer', 'tester'];
const manager: Role[] = ['release'];
const admin: Role[] = ['admin'];

/** Who may do what, as the jobs of the five roles say; written out here a second time, on purpose. */
const expected: Record<string, Role[] | 'open'> = {
  'get /health': 'open',
  'get /openapi.json': 'open',
  'post /session': 'open',
  'post /session/refresh': 'open',
  'delete /session': 'open',
  'post /password-links/check': 'open',
  'post /password': 'open',
  'get /session': all,
  'put /session/password': all,
  'get /sessions': all,
  'delete /sessions/:id': all,
  'get /people': admin,
  'post /people': admin,
  'patch /people/:id': admin,
  'post /people/:id/links': admin,
  'get /audit': admin,
  'get /targets': all,
  'post /targets': engineer,
  'get /targets/:slug': all,
  'put /targets/:slug': engineer,
  'get /plans': all,
  'post /plans': engineer,
  'post /plans/from-yaml': engineer,
  'get /plans/:id': all,
  'put /plans/:id/draft': engineer,
  'delete /plans/:id/draft': engineer,
  'post /designs': all,
  'get /plans/:id/revisions': all,
  'post /plans/:id/revisions': engineer,
  'get /revisions/:id': all,
  'get /revisions/:id/files': all,
  'get /revisions/:id/files/:name': all,
  'get /releases': all,
  'post /releases': manager,
  'get /releases/:id': all,
  'delete /releases/:id': manager,
  'put /releases/:id/entries/:slot': manager,
  'delete /releases/:id/entries/:slot': manager,
  'post /releases/:id/freeze': manager,
  'get /releases/:id/files/:name': all,
  'get /targets/:slug/releases/:version': all,
  'get /targets/:slug/releases/:version/files/:name': all,
  'get /replays': all,
  'post /replays': testers,
  'get /replays/:id': all,
  'delete /replays/:id': testers,
  'post /replays/:id/cancel': testers,
  'get /replays/:id/events': all,
  'get /replays/:id/trace': all,
  'get /search': all,
};

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

async function statusOf(key: string, role?: Role): Promise<number> {
  const [method, path] = key.split(' ') as [keyof Client, string];
  const address = path.replace(/:id/, '999').replace(/:\w+/g, 'none');
  return (await server.as(role)[method](address)).status;
}

describe('every route', () => {
  it('has a row here', () => {
    const routes = apiRoutes(server.services, { secure: false, demo: false });
    expect(routes.map(({ method, path }) => `${method} ${path}`).sort()).toEqual(Object.keys(expected).sort());
  });

  const closed = Object.entries(expected).filter(([, who]) => who !== 'open') as [string, Role[]][];
  const open = Object.keys(expected).filter((key) => expected[key] === 'open');

  it.each(closed)('%s wants a sign-in', async (key) => {
    expect(await statusOf(key)).toBe(401);
  });

  it.each(closed.flatMap(([key, who]) => roles.map((role) => [key, role, who.includes(role)] as const)))(
    '%s, %s: %s',
    async (key, role, allowed) => {
      const status = await statusOf(key, role);
      if (allowed) expect([401, 403]).not.toContain(status);
      else expect(status).toBe(403);
      expect(status).toBeLessThan(500);
    },
  );

  it.each(open.filter((key) => key !== 'delete /session'))('%s answers everybody alike', async (key) => {
    const signedOut = await statusOf(key);
    for (const role of roles) expect(await statusOf(key, role)).toBe(signedOut);
  });

  it('delete /session, the last one, ends the session of whoever asks', async () => {
    expect(await statusOf('delete /session')).toBe(204);
    for (const role of roles) {
      expect(await statusOf('delete /session', role)).toBe(204);
      expect(await statusOf('get /session', role)).toBe(401);
    }
  });
});
