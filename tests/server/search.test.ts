import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';
import { check, createRevision, createTarget } from '../support/receivers';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
  const { revisionId } = await createRevision(server, { name: 'Ranging 64 k' });
  await createRevision(server, { name: '100% _wild_' });
  await server.as('release').post('/releases', { target: 'bench', version: '2.4.0' }).expect(201);
  await server.as('tester').post('/replays', { revisionId, check }).expect(202);
});
afterAll(() => server.stop());

const find = async (q: string) =>
  (
    (
      await server
        .as('viewer')
        .get(`/search?q=${encodeURIComponent(q)}`)
        .expect(200)
    ).body as { items: object[] }
  ).items;

describe('search', () => {
  it.each([
    ['ranging', [{ kind: 'plan', label: 'Ranging 64 k, Bench', to: '/plans/1' }]],
    [
      'BENCH',
      [
        { kind: 'target', label: 'Bench', to: '/targets/bench' },
        { kind: 'release', label: 'Bench 2.4.0', to: '/releases/1' },
      ],
    ],
    ['2.4', [{ kind: 'release', label: 'Bench 2.4.0', to: '/releases/1' }]],
    ['centre', [{ kind: 'replay', label: 'Replay 1, Near the centre, Ranging 64 k', to: '/replays/1' }]],
    ['replay 1', [{ kind: 'replay', label: 'Replay 1, Near the centre, Ranging 64 k', to: '/replays/1' }]],
    ['0% _w', [{ kind: 'plan', label: '100% _wild_, Bench', to: '/plans/2' }]],
  ])('finds %s by name, whatever the case of letters', async (q, items) => {
    expect(await find(q)).toEqual(items);
  });

  it.each(['', '   ', '%%', '_______________', 'nothing like it'])('finds nothing for “%s”', async (q) => {
    expect(await find(q)).toEqual([]);
  });
});
