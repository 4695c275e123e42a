import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';
import { createRevision, createTarget, plan } from '../support/receivers';

let server: TestServer;
let planId: number;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
  planId = (await server.as('engineer').post('/plans', { plan }).expect(201)).body.id as number;
});
afterAll(() => server.stop());

describe('a new plan', () => {
  it('has no revision, and its defaults filled in', async () => {
    const { body } = await server.as('viewer').get(`/plans/${planId}`).expect(200).expect('ETag', '"1"');
    expect(body).toMatchObject({ id: planId, name: 'Bench link', head: null, draft: null, version: 1, release: null });
    expect(body.target).toEqual({ slug: 'bench', name: 'Bench' });
    expect(body.createdBy).toEqual({ id: server.people.engineer.id, name: 'The engineer' });
    // Defaults as schemas/plan.schema.json writes them; damping 1/√2 is the usual choice for order 2.
    expect(body.description.signal).toMatchObject({ samplesPerSymbol: 2, rollOff: 0.35, amplitude: 1, sampleBits: 12 });
    expect(body.description.carrier.stages[0].damping).toBe(Math.SQRT1_2);
    expect(body.description.carrier.arithmetic.overflow.integrator).toBe('saturate');
    expect(body.description.limits.phaseMarginDeg).toBe(45);
  });

  it.each([
    [{ ...plan, target: 'nowhere' }, '/target'],
    [{ ...plan, carrier: { ...plan.carrier, delay: 65 } }, '/carrier/delay'],
    [{ ...plan, colour: 'red' }, '/colour'],
    [{ ...plan, signal: {} }, '/signal/symbolRateBd'],
    [{ ...plan, carrier: { ...plan.carrier, arithmetic: { overflow: 'maybe' } } }, '/carrier/arithmetic/overflow'],
    [{ ...plan, carrier: { stages: [{ name: 'Acquire', noiseBandwidth: 0.01 }] } }, '/carrier/stages/0/name'],
  ])('is refused with a pointer into the plan: %#', async (wrong, pointer) => {
    const { body } = await server.as('engineer').post('/plans', { plan: wrong }).expect(422);
    expect(body.type).toBe('/problems/invalid');
    expect((body.faults as { pointer: string }[]).map((fault) => fault.pointer)).toContain(pointer);
  });

  it('reports every fault at once', async () => {
    const wrong = { name: '', target: 'bench', signal: { symbolRateBd: -1, rollOff: 2 } };
    const { body } = await server.as('engineer').post('/plans', { plan: wrong }).expect(422);
    const pointers = (body.faults as { pointer: string }[]).map(({ pointer }) => pointer);
    expect(pointers).toEqual(expect.arrayContaining(['/name', '/signal/symbolRateBd', '/signal/rollOff']));
  });
});

describe('the list of plans', () => {
  it('shows head, counts and the step of the last stage', async () => {
    const { planId: id } = await createRevision(server, { name: 'Listed' });
    const { body } = await server.as('engineer').get('/plans').expect(200);
    const listed = (body.items as { id: number }[]).find((item) => item.id === id)!;
    expect(listed).toMatchObject({
      name: 'Listed',
      modulation: 'QPSK',
      symbolRateBd: 1e6,
      version: 2,
      hasDraft: false,
    });
    const { head } = listed as unknown as {
      head: { number: number; counts: object; summary: Record<string, unknown> };
    };
    expect(head).toMatchObject({ number: 1, by: { name: 'The engineer' }, counts: { fail: 0 } });
    expect(head.summary).toMatchObject({ loop: 'carrier' });
    // BnT 0.005 nominal with ζ = 1/√2, D = 0: exact BnT = BnT + θ² + θ³/(4ζ), θ = BnT/(ζ + 1/(4ζ)) (Rice 2009, app. C).
    const theta = 0.005 / (Math.SQRT1_2 + 1 / (4 * Math.SQRT1_2));
    const exact = 0.005 + theta ** 2 + theta ** 3 / (4 * Math.SQRT1_2);
    expect(head.summary.noiseBandwidth).toBeCloseTo(exact, 12);
    const step = head.summary.step as number[];
    expect(step).toHaveLength(48);
    expect(Math.abs(step.at(-1)! - 1)).toBeLessThan(0.02); // settled
  });

  it('comes in pages that neither repeat nor lose a plan', async () => {
    const seen: number[] = [];
    let cursor = '';
    do {
      const { body } = await server
        .as('viewer')
        .get(`/plans?limit=1${cursor && `&cursor=${cursor}`}`)
        .expect(200);
      seen.push(...(body.items as { id: number }[]).map(({ id }) => id));
      cursor = (body.next as string | null) ?? '';
    } while (cursor);
    const { body } = await server.as('viewer').get('/plans').expect(200);
    expect(seen).toEqual((body.items as { id: number }[]).map(({ id }) => id));
    expect(body.next).toBeNull();
  });
});

describe('a draft', () => {
  const draft = { basedOn: 0, plan: { name: 'Half' }, typed: { '/carrier/delay': '3,5 µs ' } };

  it('is kept for its author alone, to the letter', async () => {
    await server.as('engineer').put(`/plans/${planId}/draft`, draft).expect(204);
    const mine = await server.as('engineer').get(`/plans/${planId}`).expect(200);
    expect(mine.body.draft).toMatchObject(draft);
    const theirs = await server.as('tester').get(`/plans/${planId}`).expect(200);
    expect(theirs.body.draft).toBeNull();
    const { body } = await server.as('engineer').get('/plans').expect(200);
    expect((body.items as { id: number; hasDraft: boolean }[]).find(({ id }) => id === planId)!.hasDraft).toBe(true);
  });

  it('takes the place of the one before', async () => {
    await server
      .as('engineer')
      .put(`/plans/${planId}/draft`, { ...draft, typed: {} })
      .expect(204);
    const { body } = await server.as('engineer').get(`/plans/${planId}`).expect(200);
    expect(body.draft.typed).toEqual({});
  });

  it('can be thrown away', async () => {
    await server.as('engineer').delete(`/plans/${planId}/draft`).expect(204);
    const { body } = await server.as('engineer').get(`/plans/${planId}`).expect(200);
    expect(body.draft).toBeNull();
  });

  it('belongs to a plan', async () => {
    await server.as('engineer').put('/plans/999/draft', draft).expect(404);
    await server.as('engineer').delete('/plans/999/draft').expect(404);
  });

  it('names its fields by pointers', async () => {
    const wrong = { ...draft, typed: { delay: '3' } };
    await server.as('engineer').put(`/plans/${planId}/draft`, wrong).expect(422);
  });
});

describe('a plan from YAML', () => {
  const yaml = [
    'name: Bench link',
    'target: bench',
    'signal: { modulation: QPSK, symbolRateBd: 1.0e+6, esN0Db: 12 }',
    'carrier:',
    '  stages:',
    '    - { name: acquire, noiseBandwidth: 0.01, until: { symbols: 2000 } }',
    '    - { name: track, noiseBandwidth: 0.005 }',
  ].join('\n');
  let before: number;

  beforeEach(async () => {
    before = (await server.db('plans')).length;
  });

  const send = (text: string) =>
    server.as('engineer').post('/plans/from-yaml').set('Content-Type', 'text/yaml').send(text);

  it('is checked and completed, and nothing is stored', async () => {
    const { body } = await send(yaml).expect(200);
    expect(body.plan).toMatchObject({ name: 'Bench link', signal: { symbolRateBd: 1e6, rollOff: 0.35 } });
    const wrapped = await server.as('engineer').post('/plans/from-yaml', { yaml }).expect(200);
    expect(wrapped.body).toEqual(body);
    expect(await server.db('plans')).toHaveLength(before);
  });

  it('takes quantities with their units, and says what it understood', async () => {
    const text = [
      'name: Bench link',
      'target: bench',
      'signal: { symbolRateBd: 38.4 kBd, esN0Db: 12 }',
      'carrier: { stages: [{ name: acquire, noiseBandwidth: 0.01 }] }',
      'environment: { carrierFrequencyHz: 1.55 GHz, carrierTolerancePpm: ±20 ppm }',
    ].join('\n');
    const { body } = await send(text).expect(200);
    expect(body.plan).toMatchObject({
      signal: { symbolRateBd: 38_400 },
      environment: { carrierFrequencyHz: 1.55e9, carrierTolerancePpm: 20 },
    });
    const understood = body.understood as { pointer: string; written: string }[];
    expect(understood.map(({ pointer, written }) => [pointer, written])).toEqual([
      ['/signal/symbolRateBd', '38.4 kBd'],
      ['/environment/carrierFrequencyHz', '1.55 GHz'],
      ['/environment/carrierTolerancePpm', '±20 ppm'],
    ]);
  });

  it.each([
    ['a quantity of another kind', yaml.replace('1.0e+6', '20 ppm'), '/signal/symbolRateBd', /ppm/],
    [
      'a unit that nobody knows',
      yaml.replace('symbols: 2000', 'symbols: 20 apples'),
      '/carrier/stages/0/until/symbols',
      /apples/,
    ],
    ['an unknown key', `${yaml}\ncolour: red`, '/colour', /not a key/],
    ['a fault of syntax', `${yaml}\n  : : [`, '', /line 8/],
    ['an empty text', '', '', /empty/],
    ['a list', '- 1', '', /must be object/],
    ['the same key twice', `${yaml}\nname: again`, '', /line/],
    [
      'a value of YAML 1.1 only: yes is text',
      yaml.replace('carrier:', 'carrier:\n  prewarp: yes'),
      '/carrier/prewarp',
      /boolean/,
    ],
    ['aliases', 'name: &a [1]\ntarget: *a', '', /aliases/],
    ['a bomb of aliases', 'a: &a [x,x,x,x]\nb: &b [*a,*a,*a,*a]\nc: &c [*b,*b,*b,*b]', '', /aliases/],
    ['a tag of JavaScript', 'name: !!js/function "function(){}"', '', /line/],
    ['two documents', `${yaml}\n---\nname: b`, '', /./],
    ['an infinity', yaml.replace('1.0e+6', '.inf'), '/signal/symbolRateBd', /./],
    ['no number', yaml.replace('1.0e+6', '.nan'), '/signal/symbolRateBd', /./],
    ['a prototype', `${yaml}\n__proto__: { admin: true }`, '/__proto__', /not a key/],
    ['a NUL', yaml.replace('Bench link', '"Bench \\0"'), '/name', /U\+0000/],
  ])('%s is refused at its place', async (_, text, pointer, detail) => {
    const { body } = await send(text).expect(422);
    const fault = (body.faults as { pointer: string; detail: string }[]).find((entry) => entry.pointer === pointer);
    expect(fault?.detail).toMatch(detail);
  });
});
