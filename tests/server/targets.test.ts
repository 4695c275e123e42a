import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';
import { createTarget, target } from '../support/receivers';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
});
afterAll(() => server.stop());

const put = (body: object, version: number, slug = 'bench') =>
  server.as('engineer').put(`/targets/${slug}`, body).set('If-Match', `"${version}"`);

const [register] = target.registerMap.registers;

describe('a target', () => {
  it('is read back as it was sent, with its numbers', async () => {
    const { body } = await server.as('viewer').get('/targets/bench').expect(200).expect('ETag', '"1"');
    expect(body).toMatchObject({ ...target, mapNumber: 1, version: 1, planCount: 0, newestRelease: null });
    expect(body).not.toHaveProperty('id');
  });

  it('is listed without its map', async () => {
    const { body } = await server.as('viewer').get('/targets').expect(200);
    expect(body.items[0]).toMatchObject({ slug: 'bench', name: 'Bench', loopClockHz: 100e6, planCount: 0 });
    expect(body.items[0]).not.toHaveProperty('registerMap');
  });

  it('has a slug of its own', async () => {
    await server.as('engineer').post('/targets', target).expect(409);
  });

  it('keeps its map number until the map changes', async () => {
    const renamed = await put({ ...target, name: 'Bench two' }, 1).expect(200);
    expect(renamed.body).toMatchObject({ name: 'Bench two', mapNumber: 1, version: 2 });
    const registerMap = { ...target.registerMap, registers: [register, { name: 'SPARE', offset: 4, fields: [] }] };
    const remapped = await put({ ...target, registerMap }, 2)
      .expect(200)
      .expect('ETag', '"3"');
    expect(remapped.body).toMatchObject({ mapNumber: 2, version: 3 });
    const moved = await put({ ...target, registerMap, baseAddress: '0x50000000' }, 3).expect(200);
    expect(moved.body).toMatchObject({ mapNumber: 3, version: 4 });
  });

  it('is not changed over a version that is not the stored one', async () => {
    await put(target, 1).expect(412);
    await server.as('engineer').put('/targets/bench', target).expect(428);
  });

  it('is not made with a map whose fields overlap; the fault points at the field', async () => {
    const fields = [
      { name: 'low', high: 8, low: 0 },
      { name: 'high', high: 16, low: 8 },
    ];
    const registerMap = { ...target.registerMap, registers: [{ name: 'TWO', offset: 0, fields }] };
    const { body } = await server
      .as('engineer')
      .post('/targets', { ...target, slug: 'other', registerMap })
      .expect(422);
    expect(body.faults[0].pointer).toMatch(/^\/registerMap\/registers\/0\/fields\/[01]/);
  });

  it('is not made with registers off their boundary; the fault points at the base address', async () => {
    const { body } = await server
      .as('engineer')
      .post('/targets', { ...target, slug: 'other', baseAddress: '0x40010002' })
      .expect(422);
    expect(body.faults).toMatchObject([{ pointer: '/baseAddress' }]);
  });

  it('is not there under another name', async () => {
    await server.as('viewer').get('/targets/none').expect(404);
    await put(target, 1, 'none').expect(404);
  });
});
