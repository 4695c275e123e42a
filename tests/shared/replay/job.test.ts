import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, it } from 'vitest';
import schema from '../../../schemas/tolerance-check.schema.json';
import type { ToleranceCheck } from '../../../shared/model/tolerance-check';
import { assertAffordable, assertReplayable, pointAt, pointCount, replayCheck } from '../../../shared/replay/job';
import { leastTrials, type ProofLimits } from '../../../shared/replay/least-trials';
import { qpskJob } from './link';

const validate = new Ajv2020({ useDefaults: true }).compile(schema);

const check: ToleranceCheck = {
  name: 'Carrier offset, both ends',
  carrierOffsetHz: { start: -155000, stop: 155000, points: 41 },
  esN0Db: [6.5, 10],
  symbols: 20000,
  trials: 400,
  seed: 65,
  limits: { lockProbability: 0.99, confidence: 0.95 },
};

describe('tolerance-check.schema.json', () => {
  it('fills the defaults in', () => {
    const short = { name: 'Short', carrierOffsetHz: { start: -1000, stop: 1000 } };
    expect(validate(short), JSON.stringify(validate.errors)).toBe(true);
    expect(short).toEqual({
      name: 'Short',
      carrierOffsetHz: { start: -1000, stop: 1000, points: 21 },
      esN0Db: [10],
      symbols: 20000,
      trials: 400,
      seed: 1,
      limits: { lockProbability: 0.99, confidence: 0.95 },
    });
  });

  // Fewer trials than that leave a check undecided even where every one of them locks.
  it('has trials enough by default to pass its own limits', () => {
    const filled: Partial<ToleranceCheck> = { name: 'Short', carrierOffsetHz: { start: 0, stop: 1 } };
    validate(filled);
    const { trials, limits } = filled as Required<ToleranceCheck>;
    expect(trials).toBeGreaterThanOrEqual(leastTrials(limits as ProofLimits));
    expect(replayCheck({ name: 'Short', carrierOffsetHz: { start: 0, stop: 1 } }).trials).toBe(trials);
  });

  it.each([
    ['/carrierOffsetHz/points', { carrierOffsetHz: { start: 0, stop: 1, points: 402 } }],
    ['/symbols', { symbols: 99 }],
    ['/trials', { trials: 10001 }],
    ['/seed', { seed: 2 ** 32 }],
    ['/esN0Db', { esN0Db: [] }],
  ])('refuses %s out of range', (pointer, change) => {
    expect(validate({ ...check, ...change })).toBe(false);
    expect(validate.errors![0]!.instancePath).toBe(pointer);
  });
});

describe('replayCheck', () => {
  it('spaces the offsets evenly and symmetrically', () => {
    const { offsetsHz } = replayCheck(check);
    expect(offsetsHz).toHaveLength(41);
    expect(offsetsHz[1]).toBe(-147250);
    expect(offsetsHz[20]).toBe(0);
    expect(offsetsHz.map((offset) => -offset + 0).reverse()).toEqual(offsetsHz);
  });

  it('takes one point at the start', () => {
    expect(replayCheck({ ...check, carrierOffsetHz: { start: 5, stop: 9, points: 1 } }).offsetsHz).toEqual([5]);
  });
});

describe('pointAt', () => {
  it('runs through the offsets first', () => {
    const job = { check: replayCheck(check) };
    expect(pointCount(job)).toBe(82);
    expect(pointAt(job, 40)).toEqual({ index: 40, offsetHz: 155000, esN0Db: 6.5 });
    expect(pointAt(job, 41)).toEqual({ index: 41, offsetHz: -155000, esN0Db: 10 });
  });

  it.each([-1, 82, 0.5])('names the point %f outside the grid', (index) => {
    expect(() => pointAt({ check: replayCheck(check) }, index)).toThrow(
      expect.objectContaining({ parameter: 'point' }),
    );
  });
});

describe('assertAffordable', () => {
  it('lets 656 million symbols pass', () => {
    expect(() => assertAffordable(check)).not.toThrow();
  });

  // 41 · 2 · 10^6 symbols a trial: 243 trials are below 2·10^10.
  it('says how many trials would be affordable', () => {
    const costly = { ...check, symbols: 1_000_000 };
    expect(() => assertAffordable(costly)).toThrow(expect.objectContaining({ parameter: '/trials' }));
    expect(() => assertAffordable(costly)).toThrow('at most 243 trials');
  });
});

describe('assertReplayable', () => {
  it('takes QPSK and refuses what has two samples a symbol', () => {
    expect(() => assertReplayable(qpskJob())).not.toThrow();
    const offset = { ...qpskJob(), modulation: 'OQPSK' };
    expect(() => assertReplayable(offset)).toThrow(expect.objectContaining({ parameter: '/signal/modulation' }));
  });

  it('allows less work where only unbounded integers are exact', () => {
    const check = { symbols: 1_000_000, trials: 2000 };
    expect(() => assertReplayable(qpskJob({ check }))).not.toThrow();
    const wide = qpskJob({ integratorBits: 60, check });
    expect(() => assertReplayable(wide)).toThrow(expect.objectContaining({ parameter: '/trials' }));
  });
});
