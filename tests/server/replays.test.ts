import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { repositories } from '../../server/repositories/index';
import { workerThreadQueue } from '../../server/replay-queue/worker-threads';
import { engineVersion } from '../../shared/engine';
import { startTestServer, type TestServer } from '../support/test-server';
import { check, createRevision, createTarget, plan } from '../support/receivers';

const silent = pino({ level: 'silent' });

let server: TestServer;
let revisionId: number;

beforeAll(async () => {
  server = await startTestServer({ queue: (store) => workerThreadQueue(store, silent, { threads: 2 }) });
  await createTarget(server);
  ({ revisionId } = await createRevision(server));
  await server.services.replayQueue.start();
});
afterAll(() => server.stop());

const request = (changes: object = {}, revision = revisionId) =>
  server.as('tester').post('/replays', { revisionId: revision, check: { ...check, ...changes } });

const read = async (id: number) => (await server.as('viewer').get(`/replays/${id}`).expect(200)).body as Replay;

interface Replay {
  id: number;
  state: string;
  digest: string;
  verdict: string;
  pointsDone: number;
  points: { index: number; offsetHz: number }[];
}

async function ended(id: number): Promise<Replay> {
  for (;;) {
    const replay = await read(id);
    if (!['queued', 'running'].includes(replay.state)) return replay;
    await sleep(20);
  }
}

describe('a replay', () => {
  it('is accepted at once, worked off, and judged', async () => {
    const { body } = await request().expect(202);
    expect(body).toMatchObject({
      pointsTotal: 3,
      verdict: null,
      by: { name: 'The tester' },
      points: expect.anything(),
    });
    const done = await ended(body.id as number);
    expect(done).toMatchObject({ state: 'done', pointsDone: 3, error: null, engine: engineVersion });
    expect(done.points.map(({ offsetHz }) => offsetHz)).toEqual([-500, 0, 500]);
    expect(['pass', 'fail', 'undecided']).toContain(done.verdict);
    const standing = await server.as('viewer').get(`/revisions/${revisionId}`).expect(200);
    expect(standing.body.replays).toEqual({ total: 1, lastVerdict: done.verdict, lastId: done.id });
  });

  it('gives the same digest twice, and another with another seed', async () => {
    const ids = [];
    for (const seed of [11, 11, 12]) ids.push((await request({ seed }).expect(202)).body.id as number);
    const [one, two, other] = [await ended(ids[0]!), await ended(ids[1]!), await ended(ids[2]!)];
    expect(one.digest).toMatch(/^[0-9a-f]{64}$/);
    expect(two.digest).toBe(one.digest);
    expect(two.points).toEqual(one.points);
    expect(other.digest).not.toBe(one.digest);
  });

  it('shows any of its trials again, worked out from the seed', async () => {
    const { id } = await ended((await request().expect(202)).body.id as number);
    const at = (query: string) => server.as('viewer').get(`/replays/${id}/trace?${query}`);
    const { body } = await at('point=1&trial=3').expect(200);
    expect(body).toMatchObject({ symbols: check.symbols });
    expect(body.phaseErrorDeg).toHaveLength((body.symbol as number[]).length);
    expect((await at('point=1&trial=3')).text).toBe(JSON.stringify(body));
    for (const query of [
      'point=3&trial=0',
      'point=0&trial=4',
      'point=0',
      'trial=0',
      'point=-1&trial=0',
      'point=x&trial=0',
    ]) {
      await at(query).expect(422);
    }
  });

  it('is refused for a check that does not fit, with a pointer into the check', async () => {
    const pointer = async (changes: object) =>
      ((await request(changes).expect(422)).body.faults as { pointer: string }[])[0]!.pointer;
    expect(await pointer({ trials: 0 })).toBe('/trials');
    expect(await pointer({ carrierOffsetHz: { start: 0 } })).toBe('/carrierOffsetHz/stop');
    expect(
      await pointer({ symbols: 1e6, trials: 10_000, carrierOffsetHz: { start: 0, stop: 1, points: 401 } }),
    ).toMatch(/^\//);
    await request({}, 999_999).expect(422);
  });

  it('needs a carrier loop', async () => {
    const clock = { stages: [{ name: 'track', noiseBandwidth: 0.002 }] };
    const { revisionId: without } = await createRevision(server, { carrier: undefined, clock, signal: plan.signal });
    const { body } = await request({}, without).expect(422);
    expect(body.faults).toEqual([{ pointer: '/revisionId', detail: 'has no carrier loop to replay' }]);
  });
});

const long = { carrierOffsetHz: { start: -1000, stop: 1000, points: 41 }, symbols: 20_000, trials: 20 };

describe('cancelling', () => {
  it('stops a running replay; its finished points stay, and the next one is worked off', async () => {
    const { body } = await request(long).expect(202);
    const id = body.id as number;
    while ((await read(id)).pointsDone < 2) await sleep(10);
    const cancelled = await server.as('tester').post(`/replays/${id}/cancel`).expect(200);
    expect(cancelled.body).toMatchObject({ state: 'cancelled', verdict: null, digest: null });
    const next = await ended((await request().expect(202)).body.id as number);
    expect(next.state).toBe('done');
    const after = await read(id);
    expect(after.state).toBe('cancelled');
    expect(after.pointsDone).toBeGreaterThanOrEqual(2);
    expect(after.pointsDone).toBeLessThan(41);
    expect(after.points).toHaveLength(after.pointsDone);
    await server.as('tester').post(`/replays/${id}/cancel`).expect(409);
  });

  it('takes a queued one back, by who asked for it', async () => {
    const first = (await request(long).expect(202)).body.id as number;
    const queued = (await request().expect(202)).body.id as number;
    await server.as('engineer').delete(`/replays/${queued}`).expect(403);
    await server.as('tester').delete(`/replays/${queued}`).expect(204);
    await server.as('viewer').get(`/replays/${queued}`).expect(404);
    while ((await read(first)).state !== 'running') await sleep(10);
    await server.as('tester').delete(`/replays/${first}`).expect(409);
    await server.as('tester').post(`/replays/${first}/cancel`).expect(200);
  });
});

describe('a server that ends', () => {
  it('puts a running replay back; the next one goes on at the first point that is not stored', async () => {
    const other = await startTestServer({ queue: (store) => workerThreadQueue(store, silent, { threads: 2 }) });
    try {
      await createTarget(other);
      const { revisionId: own } = await createRevision(other);
      await other.services.replayQueue.start();
      const short = { ...check, carrierOffsetHz: { start: -1000, stop: 1000, points: 9 }, symbols: 8_000, trials: 8 };
      const { body } = await other.as('tester').post('/replays', { revisionId: own, check: short }).expect(202);
      const stateOf = async () => (await other.as('viewer').get(`/replays/${body.id}`)).body as Replay;
      while ((await stateOf()).pointsDone < 2) await sleep(5);
      await other.services.replayQueue.stop();
      const left = await stateOf();
      expect(left.state).toBe('queued');
      expect(left.pointsDone).toBeLessThan(9);

      await other.db('replays').update({ state: 'running' }); // as after a kill: nobody put it back
      const marks = await other.db('replay_points').select('point_index', 'sequence', 'result').orderBy('sequence');
      const next = await startSecond(other);
      await next.replayQueue.start();
      while ((await stateOf()).state !== 'done') await sleep(20);
      await next.replayQueue.stop();
      const after = await other.db('replay_points').select('point_index', 'sequence', 'result').orderBy('sequence');
      expect(after.slice(0, marks.length)).toEqual(marks);

      // The same check on another server, in one go: the interruption left no trace.
      const { body: whole } = await server.as('tester').post('/replays', { revisionId, check: short }).expect(202);
      expect((await stateOf()).digest).toBe((await ended(whole.id as number)).digest);
    } finally {
      await other.stop();
    }
  });

  it('throws points of another engine away', async () => {
    const other = await startTestServer({ queue: (store) => workerThreadQueue(store, silent, { threads: 1 }) });
    try {
      await createTarget(other);
      const { revisionId: own } = await createRevision(other);
      const { replayPoints, replays } = repositories(other.db);
      const about = { engine: '0.9.0', pointsTotal: 3, personId: other.people.tester.id, at: other.clock.now };
      const id = await replays.insert({ revisionId: own, check, ...about });
      await replays.start(id, other.clock.now);
      await replayPoints.append(id, { index: 1, verdict: 'fail' } as never);
      await other.services.replayQueue.start();
      while ((await replays.find(id))!.state !== 'done') await sleep(20);
      const points = await replayPoints.list(id);
      expect((await replays.find(id))!.engine).toBe(engineVersion);
      expect(points.map(({ point }) => point.trials)).toEqual([4, 4, 4]);
    } finally {
      await other.stop();
    }
  });
});

async function startSecond(server: TestServer) {
  const { createServices } = await import('../../server/services/index');
  const base = { db: server.db, clock: () => server.clock.now, logger: silent, secret: 'x'.repeat(32), publicUrl: '' };
  return createServices(base, (store) => workerThreadQueue(store, silent, { threads: 1 }));
}

interface Event {
  id: number;
  event: string;
  data: { state?: string; index?: number };
}

/** Reads a stream of server-sent events to its end. */
async function events(address: string, headers: Record<string, string>): Promise<Event[]> {
  const response = await fetch(address, { headers });
  expect(response.headers.get('content-type')).toMatch(/^text\/event-stream/);
  const text = await response.text();
  const blocks = text.split('\n\n').filter((block) => block.startsWith('id:'));
  return blocks.map((block) => {
    const [, id, event, data] = /^id: (\d+)\nevent: (\w+)\ndata: (.*)$/.exec(block)!;
    return { id: Number(id), event: event!, data: JSON.parse(data!) as Event['data'] };
  });
}

describe('the stream of a replay', () => {
  let listening: Server;
  let base: string;
  let authorization: string;

  beforeAll(async () => {
    listening = createServer(server.app);
    await new Promise<void>((resolve) => listening.listen(0, '127.0.0.1', resolve));
    base = `http://127.0.0.1:${(listening.address() as AddressInfo).port}/api/v1`;
    const test = server.as('viewer').get('/session') as unknown as { header?: never; get(name: string): string };
    authorization = test.get('Authorization');
  });
  afterAll(() => new Promise((resolve) => listening.close(resolve)));

  const follow = (id: number, last?: number) =>
    events(`${base}/replays/${id}/events`, {
      authorization,
      ...(last !== undefined && { 'last-event-id': String(last) }),
    });

  it('brings each point once and ends after the final state', async () => {
    const { body } = await request({ seed: 21 }).expect(202);
    const seen = await follow(body.id as number);
    const points = seen.filter(({ event }) => event === 'point');
    expect(points.map(({ id }) => id)).toEqual([1, 2, 3]);
    expect(points.map(({ data }) => data.index).sort()).toEqual([0, 1, 2]);
    expect(seen.at(-1)).toMatchObject({ event: 'state', data: { state: 'done' } });
  });

  it('is taken up again after the last event that arrived', async () => {
    const { id } = await ended((await request({ seed: 22 }).expect(202)).body.id as number);
    const seen = await follow(id, 2);
    expect(seen.map(({ id, event }) => [id, event])).toEqual([
      [3, 'point'],
      [3, 'state'],
    ]);
    expect(await follow(id, 3)).toMatchObject([{ id: 3, event: 'state' }]);
    // More than there are: the points were thrown away meanwhile and worked out again.
    expect(await follow(id, 99)).toMatchObject([{ id: 3, event: 'state' }]);
  });

  it('is refused for a replay that is not there and for an id that no event has', async () => {
    await server
      .as('viewer')
      .get('/replays/999/events')
      .expect(404)
      .expect('Content-Type', /problem\+json/);
    await server.as('viewer').get('/replays/1/events').set('Last-Event-ID', 'x').expect(422);
  });

  it('ends when the server does', async () => {
    const { body } = await request(long).expect(202);
    const stream = follow(body.id as number);
    while ((await read(body.id as number)).pointsDone < 1) await sleep(10);
    server.services.replayEvents.end();
    expect((await stream).length).toBeGreaterThan(0);
    await server.as('tester').post(`/replays/${body.id}/cancel`).expect(200);
  });
});
