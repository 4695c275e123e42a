import { execFileSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { engineVersion } from '../../shared/engine';
import { startTestServer, type TestServer } from '../support/test-server';
import { createRevision, createTarget, plan } from '../support/receivers';

let server: TestServer;
let revisionId: number;
let planId: number;
let versions = 0;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
  ({ planId, revisionId } = await createRevision(server));
});
afterAll(() => server.stop());

const manager = () => server.as('release');

async function draft(): Promise<{ id: number; version: string }> {
  versions += 1;
  const { body } = await manager()
    .post('/releases', { target: 'bench', version: `1.0.${versions}` })
    .expect(201);
  return { id: body.id as number, version: body.version as string };
}

const put = (id: number, rowVersion: number, slot = 'main', revision = revisionId) =>
  manager().put(`/releases/${id}/entries/${slot}`, { revisionId: revision }).set('If-Match', `"${rowVersion}"`);

const freeze = (id: number, rowVersion: number, version: string) =>
  manager().post(`/releases/${id}/freeze`, { version }).set('If-Match', `"${rowVersion}"`);

async function frozen(): Promise<{ id: number; version: string }> {
  const release = await draft();
  await put(release.id, 1).expect(200);
  await freeze(release.id, 2, release.version).expect(200);
  return release;
}

/** A revision whose findings fail: a bandwidth of a tenth with six updates of delay leaves hardly any phase margin. */
const failing = () =>
  createRevision(server, {
    name: 'Too wide',
    carrier: { ...plan.carrier, delay: 6, stages: [{ name: 'track', damping: Math.SQRT1_2, noiseBandwidth: 0.1 }] },
  });

describe('a draft', () => {
  it('begins empty, with the gate shut that asks for an entry', async () => {
    const { id } = await draft();
    const { body } = await server.as('viewer').get(`/releases/${id}`).expect(200).expect('ETag', '"1"');
    expect(body).toMatchObject({ state: 'draft', entryCount: 0, entries: [], files: [], digest: null, frozenAt: null });
    expect(body.gates).toEqual([{ state: 'shut', text: 'The config set has no entry.' }]);
  });

  it('has a version of its own on its target', async () => {
    const { version } = await draft();
    await manager().post('/releases', { target: 'bench', version }).expect(409);
    await manager().post('/releases', { target: 'nowhere', version }).expect(422);
  });

  it.each(['1', 'v1.0.0', '1.0', '01.0.0', '1.0.0+build', '1.0.0-', 'latest', '1.0.0-01'])(
    'is not called %s',
    async (version) => {
      const { body } = await manager().post('/releases', { target: 'bench', version }).expect(422);
      expect(body.faults[0].pointer).toBe('/version');
    },
  );

  it('takes revisions into slots, replaces and gives them back', async () => {
    const { id } = await draft();
    await put(id, 1).expect(200).expect('ETag', '"2"');
    const newer = await server
      .as('engineer')
      .post(`/plans/${planId}/revisions`, { plan })
      .set('If-Match', '"2"')
      .expect(201);
    const { body } = await server.as('viewer').get(`/releases/${id}`).expect(200);
    expect(body.entries).toMatchObject([
      { slot: 'main', plan: { id: planId }, revision: { id: revisionId }, newer: 2 },
    ]);
    const replaced = await put(id, 2, 'main', newer.body.id as number).expect(200);
    expect(replaced.body.entries).toMatchObject([{ revision: { number: 2 }, newer: null }]);
    await manager().delete(`/releases/${id}/entries/main`).set('If-Match', '"3"').expect(200);
    await manager().delete(`/releases/${id}/entries/main`).set('If-Match', '"4"').expect(404);
  });

  it('does not take a revision of another target, none at all, or a slot that C could not name', async () => {
    const { id } = await draft();
    await createTarget(server, { slug: 'strange', name: 'Strange' });
    const strange = await createRevision(server, { target: 'strange' });
    for (const other of [strange.revisionId, 999_999]) {
      const { body } = await put(id, 1, 'main', other).expect(422);
      expect(body.faults[0].pointer).toBe('/revisionId');
    }
    for (const slot of ['Main', '1st', 'a-b', 'x'.repeat(32)]) await put(id, 1, slot).expect(422);
  });

  it('refuses the second of two who change it', async () => {
    const { id } = await draft();
    const answers = await Promise.all(['a', 'b', 'c', 'd'].map((slot) => put(id, 1, slot)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412, 412, 412]);
    const refused = answers.find(({ status }) => status === 412)!;
    expect(refused.body.current).toMatchObject({ id, rowVersion: 2, entryCount: 1 });
  });

  it('can be removed; the list knows the newest release of a plan', async () => {
    const { id, version } = await draft();
    await put(id, 1).expect(200);
    const listed = await server.as('viewer').get(`/plans/${planId}`).expect(200);
    expect(listed.body.release).toEqual({ version, state: 'draft', revisionNumber: 1 });
    await manager().delete(`/releases/${id}`).set('If-Match', '"2"').expect(204);
    await server.as('viewer').get(`/releases/${id}`).expect(404);
  });
});

describe('a freeze', () => {
  it('makes the files, a manifest that agrees with them, and a digest that is the manifest’s', async () => {
    const { id, version } = await frozen();
    const { body } = await server.as('viewer').get(`/releases/${id}`).expect(200);
    expect(body).toMatchObject({ state: 'frozen', frozenBy: { name: 'The release' }, rowVersion: 4, gates: [] });
    const names = (body.files as { name: string }[]).map(({ name }) => name);
    expect(names).toEqual(['main.config.h', 'main.config.yaml', 'manifest.json']);
    const text = async (name: string) => {
      const answer = await server.as('viewer').get(`/targets/bench/releases/${version}/files/${name}`).expect(200);
      return answer.text;
    };
    const manifest = await text('manifest.json');
    const sum = (content: string) => execFileSync('sha256sum', { input: content }).toString().slice(0, 64);
    expect(sum(manifest)).toBe(body.digest);
    const { entries, files, target } = JSON.parse(manifest) as Record<string, Record<string, unknown>[]>;
    expect(target).toEqual({ slug: 'bench', name: 'Bench' });
    expect(entries).toMatchObject([{ slot: 'main', plan: 'Bench link', revision: 1, engine: engineVersion }]);
    const header = await text('main.config.h');
    expect(files).toContainEqual({ name: 'main.config.h', bytes: Buffer.byteLength(header), sha256: sum(header) });
    expect(header).toContain(version);
  });

  it('gives files that may be kept for ever', async () => {
    const { id, version } = await frozen();
    const address = `/targets/bench/releases/${version}/files/main.config.h`;
    const { headers } = await server
      .as('viewer')
      .get(address)
      .expect('Cache-Control', 'private, immutable, max-age=31536000');
    await server
      .as('viewer')
      .get(address)
      .set('If-None-Match', headers.etag as string)
      .expect(304);
    await server
      .as('viewer')
      .get(`/releases/${id}/files/main.config.h`)
      .expect('ETag', headers.etag as string);
    const release = await server.as('viewer').get(`/targets/bench/releases/${version}`).expect(200);
    expect(release.body.id).toBe(id);
  });

  it('wants the version typed again', async () => {
    const { id } = await draft();
    await put(id, 1).expect(200);
    const { body } = await freeze(id, 2, '9.9.9').expect(422);
    expect(body.faults[0].pointer).toBe('/version');
    await server.as('viewer').get(`/releases/${id}`).expect('ETag', '"2"');
  });

  it('is refused for an empty set and for a failing finding, in words', async () => {
    const empty = await draft();
    const { body } = await freeze(empty.id, 1, empty.version).expect(409);
    expect(body.title).toBe('The release is not ready: The config set has no entry.');
    const release = await draft();
    const wide = await failing();
    const { body: withEntry } = await put(release.id, 1, 'wide', wide.revisionId).expect(200);
    const shut = (withEntry.gates as { state: string; text: string; link?: string }[]).find(
      ({ state }) => state === 'shut',
    );
    expect(shut).toMatchObject({
      text: expect.stringMatching(/^wide r1 has \d+ failing finding/),
      link: `/plans/${wide.planId}`,
    });
    await freeze(release.id, 2, release.version).expect(409);
  });

  it('is for the last time: nothing changes a frozen release', async () => {
    const { id, version } = await frozen();
    await put(id, 4, 'other').expect(409);
    await manager().delete(`/releases/${id}/entries/main`).set('If-Match', '"4"').expect(409);
    await manager().delete(`/releases/${id}`).set('If-Match', '"4"').expect(409);
    await freeze(id, 4, version).expect(409);
  });

  it('happens once when two ask for it, and not beside a change', async () => {
    const { id, version } = await draft();
    await put(id, 1).expect(200);
    const answers = await Promise.all([freeze(id, 2, version), freeze(id, 2, version), put(id, 2, 'late')]);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    for (const { status } of answers) expect([200, 409, 412]).toContain(status);
  });

  it('is what makes files: a draft has none', async () => {
    const { id, version } = await draft();
    await put(id, 1).expect(200);
    await server.as('viewer').get(`/releases/${id}/files/main.config.h`).expect(404);
    await server.as('viewer').get(`/targets/bench/releases/${version}/files/main.config.h`).expect(404);
  });
});

describe('the list of releases', () => {
  it('is of one target when asked', async () => {
    const { body } = await server.as('viewer').get('/releases?target=strange').expect(200);
    expect(body.items).toEqual([]);
    const all = await server.as('viewer').get('/releases').expect(200);
    const ids = (all.body.items as { id: number }[]).map(({ id }) => id);
    expect(ids).toEqual([...ids].sort((a, b) => b - a));
  });
});
