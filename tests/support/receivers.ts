import type { Plan } from '../../shared/model/plan';
import type { TargetBody } from '../../shared/model/target';
import type { TestServer } from './test-server';

/** A target with one register, enough for everything but its own tests. */
export const target: TargetBody = {
  slug: 'bench',
  name: 'Bench',
  loopClockHz: 100e6,
  cPrefix: 'BEN_',
  baseAddress: '0x40000000',
  registerMap: {
    wordBits: 32,
    byteOrder: 'little',
    registers: [{ name: 'FCW', offset: 0, fields: [{ name: 'fcw', high: 31, low: 0, quantity: 'carrier.nco.fcw' }] }],
  },
};

/** A plan without a failing finding, its defaults left out as people leave them out. */
export const plan = {
  name: 'Bench link',
  target: 'bench',
  signal: { modulation: 'QPSK', symbolRateBd: 1e6, esN0Db: 12 },
  carrier: {
    detector: 'sign',
    stages: [
      { name: 'acquire', noiseBandwidth: 0.01, until: { symbols: 2000 } },
      { name: 'track', noiseBandwidth: 0.005 },
    ],
  },
} satisfies Plan;

export const check = {
  name: 'Near the centre',
  carrierOffsetHz: { start: -500, stop: 500, points: 3 },
  esN0Db: [12],
  symbols: 1500,
  trials: 4,
  seed: 7,
  limits: { lockProbability: 0.3, confidence: 0.95 },
};

/** Creates the target over the API. */
export async function createTarget({ as }: TestServer, changes: Partial<TargetBody> = {}): Promise<void> {
  await as('engineer')
    .post('/targets', { ...target, ...changes })
    .expect(201);
}

/** Creates a plan with one saved revision over the API. @returns both ids */
export async function createRevision(
  { as }: TestServer,
  changes: object = {},
): Promise<{ planId: number; revisionId: number }> {
  const described = { ...plan, ...changes };
  const created = await as('engineer').post('/plans', { plan: described }).expect(201);
  const planId = created.body.id as number;
  const save = as('engineer').post(`/plans/${planId}/revisions`, { plan: described, note: 'first' });
  const saved = await save.set('If-Match', '"1"').expect(201);
  return { planId, revisionId: saved.body.id as number };
}
