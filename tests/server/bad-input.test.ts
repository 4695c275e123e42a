import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';
import { check, createRevision, createTarget, plan, target } from '../support/receivers';

let server: TestServer;
let planId: number;
let authorization: string;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
  ({ planId } = await createRevision(server));
  authorization = server.as('engineer').get('/plans').get('Authorization');
});
afterAll(() => server.stop());

/** Sends bytes as they stand, with the engineer's token. */
const send = (path: string, body: string | Buffer, type = 'application/json', method: 'post' | 'put' = 'post') =>
  supertest(server.app)
    [method](`/api/v1${path}`)
    .set('Authorization', authorization)
    .set('If-Match', '"1"')
    .set('Content-Type', type)
    .serialize((data: unknown) => data as string)
    .send(body);

const withPlan = (changes: object): string => JSON.stringify({ plan: { ...plan, ...changes } });
const nested = (depth: number): string => `${'['.repeat(depth)}${']'.repeat(depth)}`;
const draft = (typed: string): string => `{"basedOn":0,"plan":{},"typed":{"/name":${typed}}}`;

describe('a body that cannot be accepted', () => {
  it.each<[string, number, string, string | Buffer, string?]>([
    ['malformed JSON', 400, '/plans', '{"plan":'],
    ['an empty body', 422, '/plans', ''],
    ['JSON that is neither object nor array', 400, '/plans', '"plan"'],
    ['null', 400, '/plans', 'null'],
    ['an array', 422, '/plans', '[]'],
    ['more than 1 MB', 413, '/plans', JSON.stringify({ plan: 'x'.repeat(1_000_001) })],
    ['plain text', 415, '/plans', withPlan({}), 'text/plain'],
    ['a form', 415, '/plans', 'plan=1', 'application/x-www-form-urlencoded'],
    ['no type', 415, '/plans', withPlan({}), ''],
    ['a character set that nobody reads', 415, '/plans', withPlan({}), 'application/json; charset=klingon'],
    [
      'bytes that are no UTF-8',
      400,
      '/plans',
      Buffer.from(withPlan({ name: '\u0001' }).replace('\\u0001', '\u00ff'), 'latin1'),
    ],
    ['a NUL in a name', 422, '/plans', withPlan({ name: 'a\u0000b' })],
    [
      'half of a character in a name',
      422,
      '/plans',
      '{"plan":{"name":"\\ud83d","target":"bench","signal":{"symbolRateBd":1}}}',
    ],
    ['half of a character in a key', 422, '/plans', '{"plan":{"\\udc00":1}}'],
    ['a control character in a name', 422, '/plans', withPlan({ name: 'line\nbreak' })],
    ['a name of spaces', 422, '/plans', withPlan({ name: '   ' })],
    ['a name that is too long', 422, '/plans', withPlan({ name: 'x'.repeat(81) })],
    ['a number beyond every double', 422, '/plans', withPlan({}).replace('1000000', '1e999')],
    ['a number beyond the range', 422, '/plans', withPlan({ signal: { symbolRateBd: 1e300 } })],
    ['a number below the least double', 422, '/plans', withPlan({ signal: { symbolRateBd: 5e-324 } })],
    ['text where a number belongs', 422, '/plans', withPlan({ signal: { symbolRateBd: '1e6' } })],
    ['an integer with a fraction', 422, '/plans', withPlan({ carrier: { ...plan.carrier, delay: 1.5 } })],
    ['nesting that no plan has', 422, '/plans', `{"plan":${nested(200)}}`],
    ['nesting that breaks a recursive reader', 422, '/plans', `{"plan":${nested(200_000)}}`],
    ['a prototype', 422, '/plans', '{"plan":{"__proto__":{"name":"x"}}}'],
    ['a constructor', 422, '/plans', '{"plan":{"constructor":{"prototype":{}}}}'],
    ['a target that is not there', 422, '/plans', withPlan({ target: 'nowhere' })],
    ['a slug with SQL in it', 422, '/plans', withPlan({ target: "bench' OR '1'='1" })],
    [
      'nine stages',
      422,
      '/plans',
      withPlan({ carrier: { stages: Array.from({ length: 9 }, (_, i) => ({ name: `s${i}` })) } }),
    ],
    ['a design without a plan', 422, '/designs', '{}'],
    ['YAML of a type that nobody sends', 415, '/plans/from-yaml', 'a: 1', 'text/html'],
    ['YAML of more than 200 kB', 422, '/plans/from-yaml', 'x'.repeat(200_001), 'text/yaml'],
    ['YAML with deep nesting', 422, '/plans/from-yaml', nested(50_000), 'text/yaml'],
    ['a target without registers', 422, '/targets', JSON.stringify({ ...target, slug: 'x', registerMap: {} })],
    ['a base address that is none', 422, '/targets', JSON.stringify({ ...target, slug: 'x', baseAddress: '0xzz' })],
    ['a replay of a revision with a broken id', 422, '/replays', JSON.stringify({ revisionId: '1', check })],
    ['a replay of a revision with a huge id', 422, '/replays', JSON.stringify({ revisionId: 1e300, check })],
    ['a note with a NUL', 422, '/plans/:plan/revisions', JSON.stringify({ plan, note: '\u0000' })],
    ['a note that is too long', 422, '/plans/:plan/revisions', JSON.stringify({ plan, note: 'x'.repeat(501) })],
  ])('%s: %i', async (_, status, path, body, type = 'application/json') => {
    const response = await send(path.replace(':plan', String(planId)), body, type);
    expect(response.status).toBe(status);
    expect(response.headers['content-type']).toMatch(/^application\/problem\+json/);
    expect(response.body).toMatchObject({ status, title: expect.stringMatching(/\.$/) });
    if (status === 422) expect(response.body.faults.length).toBeGreaterThan(0);
  });

  it('is cut off in a zipped bomb too', async () => {
    const { gzipSync } = await import('node:zlib');
    const bomb = gzipSync(Buffer.alloc(20_000_000, 0x20));
    await send('/plans', bomb).set('Content-Encoding', 'gzip').expect(413);
    await send('/plans', 'x').set('Content-Encoding', 'unknown').expect(415);
    await send('/plans', 'not gzip').set('Content-Encoding', 'gzip').expect(400);
  });
});

describe('text that is unusual and right', () => {
  it.each([
    'Ünïcödé α ζ µ',
    '衛星 17',
    'link 🛰️ 4-byte',
    "Robert'); DROP TABLE plans;--",
    '<script>alert(1)</script>',
    '100 % _like_ \\',
  ])('comes back to the letter: %s', async (name) => {
    const { body } = await server
      .as('engineer')
      .post('/plans', { plan: { ...plan, name } })
      .expect(201);
    expect((await server.as('viewer').get(`/plans/${body.id}`)).body.name).toBe(name);
  });

  it('is kept in drafts too, and refused there when it cannot be', async () => {
    const put = (typed: string) => send(`/plans/${planId}/draft`, draft(typed), 'application/json', 'put');
    await put('"🛰 ± ’"').expect(204);
    const { body } = await server.as('engineer').get(`/plans/${planId}`);
    expect(body.draft.typed).toEqual({ '/name': '🛰 ± ’' });
    await put('"\\ud83d"').expect(422);
    await put('"a\\u0000"').expect(422);
  });
});

describe('an address that leads nowhere', () => {
  it.each([
    '/plans/0',
    '/plans/-1',
    '/plans/1.5',
    '/plans/1e3',
    '/plans/0x1',
    '/plans/9999999999999999999999',
    '/plans/999999999999999',
    '/plans/1%00',
    '/plans/%27%20OR%201=1',
    '/plans/none/revisions',
    '/revisions/999',
    '/targets/%00',
    '/targets/Bench',
    '/targets/%F0%9F%9B%B0',
    '/targets/bench/releases/1.0.0',
    '/targets/bench/releases/1.0.0/files/..%2F..%2Fetc%2Fpasswd',
    '/releases/1/files/manifest.json',
    '/replays/1',
    '/nothing',
    '/plans/1/nothing',
  ])('%s: 404', async (path) => {
    const { body } = await server
      .as('engineer')
      .get(path)
      .expect(404)
      .expect('Content-Type', /problem\+json/);
    expect(body.type).toBe('/problems/not-found');
  });

  it('is refused as malformed when it cannot be decoded', async () => {
    await server.as('engineer').get('/plans/%E0%A4%A').expect(400);
  });
});

describe('a query that makes no sense', () => {
  it.each([
    ['/plans?cursor=!!!', '/cursor'],
    ['/plans?cursor=LTE', '/cursor'],
    ['/plans?cursor=bm9uZQ', '/cursor'],
    ['/plans?cursor=1&cursor=2', '/cursor'],
    ['/plans?limit=0', '/limit'],
    ['/plans?limit=101', '/limit'],
    ['/plans?limit=-1', '/limit'],
    ['/plans?limit=ten', '/limit'],
    ['/plans?limit=1&limit=2', '/limit'],
    ['/replays?revisionId=x', '/revisionId'],
    ['/search?q=a&q=b', '/q'],
    ['/releases?target=%00', '/target'],
    ['/releases?target=%F0%9F%9B%B0', '/target'],
  ])('%s: 422', async (path, pointer) => {
    const { body } = await server.as('engineer').get(path).expect(422);
    expect(body.faults[0].pointer).toBe(pointer);
  });

  it.each([
    '/search?q=%00',
    '/search?q=%F0%9F%9B%B0%20%F0%9F%9B%B0',
    '/search?q=%25%25',
    '/search?q=' + 'x'.repeat(5000),
    '/search',
  ])('%s finds nothing, and that is no fault', async (path) => {
    const { body } = await server.as('engineer').get(path).expect(200);
    expect(body.items).toEqual([]);
  });
});
