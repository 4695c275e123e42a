import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Ajv2020 } from 'ajv/dist/2020';
import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { apiRoutes } from '../../server/routes/index';
import { startTestServer, type TestServer } from '../support/test-server';
import { createTarget, plan } from '../support/receivers';
import { temporaryFolder } from '../support/temporary-folder';

let server: TestServer;
const lines: string[] = [];

function builtApplication(): string {
  const folder = temporaryFolder('web');
  mkdirSync(join(folder, 'assets'));
  writeFileSync(join(folder, 'index.html'), '<!doctype html><title>Keepstep</title>');
  writeFileSync(join(folder, 'assets', 'index-abc123.js'), 'export {};');
  writeFileSync(join(folder, 'favicon.svg'), '<svg/>');
  return folder;
}

beforeAll(async () => {
  const log = { write: (line: string) => void lines.push(line) };
  server = await startTestServer({ log, webFolder: builtApplication(), secure: true });
  await createTarget(server);
});
afterAll(() => server.stop());

const get = (path: string) => supertest(server.app).get(path);

describe('every answer', () => {
  it('forbids what the application does not need', async () => {
    const { headers } = await get('/').expect(200);
    const policy = Object.fromEntries(
      String(headers['content-security-policy'])
        .split(';')
        .map((rule) => [rule.split(' ')[0], rule.split(' ').slice(1).join(' ')]),
    );
    expect(policy).toMatchObject({
      'default-src': "'self'",
      'script-src': "'self'",
      'style-src': "'self' 'unsafe-inline'",
      'object-src': "'none'",
      'frame-ancestors': "'none'",
    });
    expect(policy).not.toHaveProperty('upgrade-insecure-requests');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers).not.toHaveProperty('x-powered-by');
  });

  it('carries the id that the log has', async () => {
    const { headers } = await get('/api/v1/health').expect(200);
    expect(lines.some((line) => line.includes(String(headers['x-request-id'])))).toBe(true);
  });

  it('of the API is kept by nobody', async () => {
    await server.as('viewer').get('/plans').expect('Cache-Control', 'no-store');
  });
});

describe('the web application', () => {
  it.each(['/', '/plans', '/plans/7', '/targets/corvid-c2', '/password/token'])('is the answer to %s', async (path) => {
    const { text } = await get(path).expect(200).expect('Cache-Control', 'no-cache').expect('Content-Type', /html/);
    expect(text).toContain('<title>Keepstep</title>');
  });

  it('may keep files with a hash in their names for ever, and no others', async () => {
    await get('/assets/index-abc123.js').expect('Cache-Control', /immutable/);
    await get('/favicon.svg').expect('Cache-Control', 'no-cache');
  });

  it('is not the answer to a script that is gone, nor to a path of the API', async () => {
    await get('/assets/index-old.js').expect(404);
    await get('/api/v1/nothing')
      .expect(404)
      .expect('Content-Type', /problem\+json/);
    await get('/api/v2/plans')
      .expect(404)
      .expect('Content-Type', /problem\+json/);
    await get('/api').expect(404);
  });

  it('shows nothing of the files around it', async () => {
    for (const path of ['/..%2f..%2fetc/passwd', '/assets/..%2f..%2fpackage.json', '/%00', '/.git/config']) {
      const { status, text } = await get(path);
      expect(status).toBeLessThan(500);
      expect(text).not.toMatch(/root:|"name"|\[core\]/);
    }
  });
});

describe('cookies behind https', () => {
  it('are sent by https only', async () => {
    const { link } = await server.services.people.newLink(server.people.viewer.id, server.people.admin.id);
    await server.services.passwords.setByLink(link.split('/').at(-1)!, 'password of the viewer');
    await server.db('sessions').update({ revoked_at: null }); // a new password ends all sessions
    const body = { email: 'viewer@test.example', password: 'password of the viewer' };
    const { headers } = await supertest(server.app).post('/api/v1/session').send(body).expect(200);
    expect(headers['set-cookie']![0]).toMatch(/; Secure; SameSite=Strict$/);
  });
});

describe('the log', () => {
  it('has a line for each request, and neither tokens nor passwords nor addresses of one-time links', async () => {
    const { link } = await server.services.people.newLink(server.people.tester.id, server.people.admin.id);
    const token = link.split('/').at(-1)!;
    await get(`/password/${token}`).expect(200);
    await supertest(server.app).post('/api/v1/password-links/check').send({ token }).expect(200);
    await supertest(server.app).post('/api/v1/session').send({ email: 'a@b.example', password: 'sEcret-word' });
    const authorization = server.as('viewer').get('/plans').get('Authorization');
    await server.as('viewer').get('/search?q=a-private-name').expect(200);
    const log = lines.join('');
    expect(log).toContain('/api/v1/search');
    for (const secret of [token, 'sEcret-word', authorization.split('.')[2]!, 'a-private-name', '$argon2id']) {
      expect(log).not.toContain(secret);
    }
  });

  it('has a defect whole, of which the answer shows nothing', async () => {
    await server.owner.raw('RENAME TABLE targets TO hidden');
    const { body } = await server.as('viewer').get('/targets').expect(500);
    await server.owner.raw('RENAME TABLE hidden TO targets');
    expect(body).toEqual({
      type: '/problems/internal',
      title: 'Something went wrong on the server. It has been written down.',
      status: 500,
      faults: [],
    });
    expect(lines.some((line) => line.includes('ER_NO_SUCH_TABLE'))).toBe(true);
  });
});

describe('the API description', () => {
  interface Description {
    openapi: string;
    paths: Record<string, Record<string, { security: object[]; requestBody?: object; parameters: { name: string }[] }>>;
    components: { schemas: Record<string, object> };
  }
  let description: Description;

  beforeAll(async () => {
    description = (await get('/api/v1/openapi.json').expect(200)).body as Description;
  });

  it('has every route and nothing else', () => {
    const described = Object.entries(description.paths).flatMap(([path, operations]) =>
      Object.keys(operations).map((method) => `${method} ${path}`),
    );
    const routes = apiRoutes(server.services, { secure: false, demo: false });
    const mounted = routes.map(({ method, path }) => `${method} ${path.replace(/:(\w+)/g, '{$1}')}`);
    expect(description.openapi).toBe('3.1.0');
    expect(described.sort()).toEqual(mounted.sort());
  });

  it('names the parameters of its paths', () => {
    for (const [path, operations] of Object.entries(description.paths)) {
      const wanted = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      for (const { parameters } of Object.values(operations)) {
        expect(parameters.map(({ name }) => name)).toEqual(expect.arrayContaining(wanted));
      }
    }
  });

  it('has schemas that stand by themselves: a plan can be checked with them', () => {
    const ajv = new Ajv2020({ strict: false });
    ajv.addSchema({ $id: 'openapi', ...description });
    const validate = ajv.getSchema('openapi#/components/schemas/PlanCreate')!;
    expect(validate({ plan })).toBe(true);
    expect(validate({ plan: { ...plan, colour: 'red' } })).toBe(false);
    expect(ajv.getSchema('openapi#/components/schemas/Design')).toBeTypeOf('function');
  });
});
