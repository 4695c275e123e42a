import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import type { Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson, digestOf } from '../../server/services/digest';
import { engineVersion } from '../../shared/engine';
import { startTestServer, type TestServer } from '../support/test-server';
import { createRevision, createTarget, plan } from '../support/receivers';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
});
afterAll(() => server.stop());

const save = (planId: number, version: number, body: object) =>
  server.as('engineer').post(`/plans/${planId}/revisions`, body).set('If-Match', `"${version}"`);

describe('canonicalJson', () => {
  // RFC 8785, section 3.2.3 (sorting by UTF-16 units) and 3.2.2.3 (numbers); expected text from the RFC.
  it('writes the example of RFC 8785', () => {
    const example = {
      numbers: [Number('333333333.33333329'), 1e30, 4.5, 2e-3, 0.000000000000000000000000001],
      string: '\u20ac$\u000F\u000aA\'\u0042\u0022\u005c\\"/',
      literals: [null, true, false],
    };
    expect(canonicalJson(example)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],' +
        '"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    );
  });

  it('gives the digest that sha256sum gives of the same bytes', () => {
    const [sum] = execFileSync('sha256sum', { input: '{"a":"µ"}' }).toString().split(' ');
    expect(digestOf({ a: 'µ' })).toBe(sum);
  });
});

describe('a revision', () => {
  it('is numbered, raises the version of its plan and takes the author’s draft with it', async () => {
    const { planId } = await createRevision(server);
    await server.as('engineer').put(`/plans/${planId}/draft`, { basedOn: 1, plan: {}, typed: {} }).expect(204);
    const { body } = await save(planId, 2, { plan: { ...plan, name: 'Renamed' }, note: 'Second.' }).expect(201);
    expect(body).toMatchObject({ number: 2, note: 'Second.', by: { name: 'The engineer' }, engine: engineVersion });
    const stored = await server.as('engineer').get(`/plans/${planId}`).expect(200);
    expect(stored.body).toMatchObject({ name: 'Renamed', version: 3, draft: null, head: { number: 2 } });
    expect(stored.body.description).toEqual(body.description);
    const list = await server.as('viewer').get(`/plans/${planId}/revisions`).expect(200);
    expect((list.body.items as { number: number }[]).map(({ number }) => number)).toEqual([2, 1]);
  });

  it('is read back to the last bit: design, words, plan', async () => {
    const { planId } = await createRevision(server);
    const description = { ...plan, signal: { ...plan.signal, symbolRateBd: 1e6 / 3 } };
    const { body } = await save(planId, 2, { plan: description }).expect(201);
    const read = await server.as('viewer').get(`/revisions/${body.id}`).expect(200);
    expect(read.text).toBe(JSON.stringify(body));
    expect(read.body.description.signal.symbolRateBd).toBe(1e6 / 3);
  });

  it('has the digest of engine, plan and words, worked out here without the server’s own function', async () => {
    const { revisionId } = await createRevision(server);
    const { body } = await server.as('viewer').get(`/revisions/${revisionId}`).expect(200);
    const { engine, plan: described, carrier } = body.design;
    const sorted = (value: unknown): unknown =>
      Array.isArray(value)
        ? value.map(sorted)
        : value && typeof value === 'object'
          ? Object.fromEntries(
              Object.entries(value)
                .sort(([a], [b]) => (a < b ? -1 : 1))
                .map(([k, v]) => [k, sorted(v)]),
            )
          : value;
    const text = JSON.stringify(sorted({ engine, plan: described, words: { carrier: carrier.words } }));
    expect(body.digest).toBe(createHash('sha256').update(text).digest('hex'));
    expect(body.design.digest).toBe(body.digest);
  });

  it('has the same digest for the same plan, another for another plan, whatever its target holds', async () => {
    const one = await createRevision(server);
    const two = await createRevision(server);
    const other = await createRevision(server, { signal: { ...plan.signal, esN0Db: 13 } });
    const digest = async (id: number) => (await server.as('viewer').get(`/revisions/${id}`)).body.digest as string;
    expect(await digest(one.revisionId)).toBe(await digest(two.revisionId));
    expect(await digest(one.revisionId)).not.toBe(await digest(other.revisionId));
  });

  it('keeps the target as it was', async () => {
    await createTarget(server, { slug: 'moving', name: 'Before' });
    const { revisionId } = await createRevision(server, { target: 'moving' });
    const stored = await server.as('engineer').get('/targets/moving');
    const { planCount: _p, newestRelease: _n, mapNumber: _m, version: _v, ...target } = stored.body;
    await server
      .as('engineer')
      .put('/targets/moving', { ...target, name: 'After' })
      .set('If-Match', '"1"')
      .expect(200);
    const { body } = await server.as('viewer').get(`/revisions/${revisionId}`).expect(200);
    expect(body.target.name).toBe('Before');
  });

  it('says what the registers of its target do not hold', async () => {
    const { revisionId } = await createRevision(server);
    const { body } = await server.as('viewer').get(`/revisions/${revisionId}`).expect(200);
    const slugs = (body.design.findings as { slug: string }[]).map(({ slug }) => slug);
    expect(slugs.some((slug) => slug.startsWith('register.') || slug.startsWith('map.'))).toBe(true);
  });

  it('is refused where no loop can be worked out, with a pointer into the plan', async () => {
    const { planId } = await createRevision(server);
    const [acquire] = plan.carrier.stages;
    const twice = { ...plan, carrier: { stages: [acquire, acquire] } };
    const { body } = await save(planId, 2, { plan: twice }).expect(422);
    expect(body.faults[0].pointer).toBe('/carrier/stages/1/name');
  });
});

describe('the second of two who save', () => {
  it('is refused with what the first one stored, and loses nothing', async () => {
    const { planId } = await createRevision(server);
    await save(planId, 2, { plan: { ...plan, signal: { ...plan.signal, esN0Db: 14 } }, note: 'mine' }).expect(201);
    const { body } = await save(planId, 2, { plan, note: 'theirs' }).expect(412);
    expect(body).toMatchObject({ type: '/problems/stale', current: { version: 3, head: { number: 2, note: 'mine' } } });
    expect(body.current.description.signal.esN0Db).toBe(14);
  });

  it('is told so even when eight save in the same moment: one wins', async () => {
    const { planId } = await createRevision(server);
    const saves = Array.from({ length: 8 }, (_, i) => save(planId, 2, { plan, note: `writer ${i}` }));
    const answers = await Promise.all(saves);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, ...Array.from({ length: 7 }, () => 412)]);
    const numbers = await server.db('revisions').where({ plan_id: planId }).orderBy('number').pluck('number');
    expect(numbers).toEqual([1, 2]);
    for (const { body } of answers.filter(({ status }) => status === 412)) expect(body.current.version).toBe(3);
  });

  it('must say what the edits start from', async () => {
    const { planId } = await createRevision(server);
    await server.as('engineer').post(`/plans/${planId}/revisions`, { plan }).expect(428);
    await save(planId, 2, { plan }).set('If-Match', '"nonsense"').expect(412);
    await save(999, 1, { plan }).expect(404);
  });
});

describe('files of a revision', () => {
  it('are the same bytes each time, with the size and the SHA-256 that the list says', async () => {
    const { revisionId } = await createRevision(server);
    const { body } = await server.as('viewer').get(`/revisions/${revisionId}/files`).expect(200);
    const listed = body.items as { name: string; bytes: number; sha256: string }[];
    expect(listed.map(({ name }) => name)).toEqual(['config.h', 'config.yaml', 'config.json']);
    for (const { name, bytes, sha256 } of listed) {
      const file = await server
        .as('viewer')
        .get(`/revisions/${revisionId}/files/${name}`)
        .buffer(true)
        .parse(asText)
        .expect(200);
      const text = file.body as string;
      expect(Buffer.byteLength(text)).toBe(bytes);
      expect(execFileSync('sha256sum', { input: text }).toString().slice(0, 64)).toBe(sha256);
      expect(file.headers.etag).toBe(`"${sha256}"`);
    }
  });

  it('come as what they are, and to be saved when asked', async () => {
    const { revisionId } = await createRevision(server);
    const at = (name: string) => server.as('viewer').get(`/revisions/${revisionId}/files/${name}`);
    await at('config.h').expect('Content-Type', 'text/x-c; charset=utf-8');
    await at('config.yaml').expect('Content-Type', 'application/yaml; charset=utf-8');
    await at('config.h?download=1').expect('Content-Disposition', /^attachment; filename="?config\.h"?$/);
    const { headers } = await at('config.h');
    await at('config.h')
      .set('If-None-Match', headers.etag as string)
      .expect(304);
  });

  it.each(['none', 'config.hh', '..%2Fconfig.h', '%00', 'constructor', '__proto__'])(
    'are not called %s',
    async (name) => {
      const { revisionId } = await createRevision(server);
      expect([400, 404]).toContain((await server.as('viewer').get(`/revisions/${revisionId}/files/${name}`)).status);
    },
  );
});

function asText(response: Response, done: (error: Error | null, body: string) => void): void {
  const parts: Buffer[] = [];
  response.on('data', (part: Buffer) => parts.push(part)).on('end', () => done(null, Buffer.concat(parts).toString()));
}
