import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { Solution } from '../../../shared/model/design';
import type { Plan } from '../../../shared/model/plan';
import { withValue } from '../../../shared/plan/pointer';
import { filled, samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';

const solutionsOf = (plan: Plan) => workOut(structuredClone(plan)).solutions;
const pick = (plan: Plan, slug: string, loop = 'carrier'): Solution =>
  solutionsOf(plan).find((each) => each.slug === slug && each.loop === loop)!;
const withParts = (parts: PlanParts): Plan => samplePlan(parts);
const set = (plan: Plan, pointer: string, value: unknown): Plan => filled(withValue(plan, pointer, value));

const carrier = (plan: Plan) => workOut(structuredClone(plan)).carrier!;

/** Least phase margin of an order-2 loop by scanning |L| = 1 in complex arithmetic: independent of the engine. */
function marginByScan(g1: number, g2: number, delay: number): number {
  let before = Infinity;
  for (let omega = 1e-5; omega < 3; omega *= 1.00002) {
    // L = z^−(1+D)/(1 − z⁻¹)·(g1 + g2/(1 − z⁻¹)).
    const [yRe, yIm] = [1 - Math.cos(omega), Math.sin(omega)];
    const y2 = yRe * yRe + yIm * yIm;
    const [inRe, inIm] = [g1 + (g2 * yRe) / y2, (-g2 * yIm) / y2];
    const [re, im] = [(inRe * yRe + inIm * yIm) / y2, (inIm * yRe - inRe * yIm) / y2];
    const level = Math.hypot(re, im);
    if (before > 1 && level <= 1) return 180 + ((Math.atan2(im, re) - (1 + delay) * omega) * 180) / Math.PI;
    before = level;
  }
  return NaN;
}

describe('margin solutions', () => {
  // Independent: the margin of the named bandwidth's textbook gains (M. Rice 2009), found by scanning |L| = 1.
  it.each([3, 10, 40])('name the bandwidth that has the margin, delay %i', (delay) => {
    const plan = withParts({ carrier: { delay }, limits: { phaseMarginDeg: 50 } });
    const { value } = pick(plan, 'margin.widest-bandwidth');
    const theta = value! / (1.5 * Math.SQRT1_2);
    const scale = 1 + Math.SQRT2 * theta + theta ** 2;
    const margin = marginByScan((2 * Math.SQRT2 * theta) / scale, (4 * theta ** 2) / scale, delay);
    expect(margin).toBeCloseTo(50, 1);
  });

  // Derived: BnT 0.01, ζ = 1/√2 has 56.4° at D = 5 and 48.0° at D = 10; 1.68° a step puts 50° between 8 and 9.
  it('name the largest delay that keeps it', () => {
    const plan = withParts({ limits: { phaseMarginDeg: 50 } });
    expect(pick(plan, 'margin.largest-delay')).toMatchObject({ value: 8, stage: 'acquire', unit: 'updates' });
  });

  it('say it where nothing keeps the margin, and where everything does', () => {
    const never = pick(withParts({ limits: { phaseMarginDeg: 80 } }), 'margin.widest-bandwidth');
    expect(never).toMatchObject({ value: null, change: null });
    expect(never.note).toContain('no bandwidth keeps 80°');
    const always = pick(withParts({ carrier: { delay: 0 }, limits: { phaseMarginDeg: 1 } }), 'margin.widest-bandwidth');
    expect(always.note).toContain('Every bandwidth');
  });
});

describe('jitter solutions', () => {
  it('name bandwidths whose total is the limit', () => {
    const plan = withParts({ limits: { phaseJitterDeg: 2.2 } });
    for (const slug of ['jitter.widest-bandwidth', 'jitter.narrowest-bandwidth']) {
      const { value } = pick(plan, slug);
      const there = carrier(set(plan, '/carrier/stages/1/noiseBandwidth', value));
      expect(there.budget!.stages[1]!.total).toBeCloseTo(2.2, 2);
    }
  });

  // BnT/γ with the excess 1.0354 of the `sign` detector at 10 dB (derived): without an oscillator 2° needs 0.01177·(exact over asked).
  it('follow the thermal law where nothing else is there', () => {
    const plan = withParts({
      environment: { phaseNoise: undefined },
      carrier: { delay: 0 },
      limits: { phaseJitterDeg: 2 },
    });
    const { value } = pick(plan, 'jitter.widest-bandwidth');
    const theta = value! / (1.5 * Math.SQRT1_2);
    // Exact BnT = BnT + θ² + θ³/(4ζ) of the nominal gains (derived).
    const exact = value! + theta ** 2 + theta ** 3 / (4 * Math.SQRT1_2);
    expect((Math.sqrt((1.0354 * exact) / 10) * 180) / Math.PI).toBeCloseTo(2, 2);
  });

  it('name the least total where no bandwidth meets the limit', () => {
    const { value, note } = pick(withParts({ limits: { phaseJitterDeg: 1 } }), 'jitter.widest-bandwidth');
    expect(value).toBeNull();
    expect(note).toContain('the least total is 1.95°');
  });

  it('serve the clock loop in symbols', () => {
    const plan = withParts({});
    const { value, limitText } = pick(plan, 'jitter.widest-bandwidth', 'clock');
    expect(limitText).toBe('Timing jitter, max 0.01 symbols rms');
    const there = workOut(set(plan, '/clock/stages/1/noiseBandwidth', value)).clock!;
    expect(there.budget!.stages[1]!.total).toBeCloseTo(0.01, 4);
  });
});

describe('acquisition solutions', () => {
  const slow = withParts({ limits: { acquisitionSymbols: 2000 }, environment: { carrierTolerancePpm: 100 } });

  // Published: pull-in Δω²/(4ζωn³⟨s²⟩); ⟨s²⟩ of `sign` QPSK at 10 dB lies between 1/(2·16) of sin 4φ/4 and 0.1817 without noise.
  it('name an offset between those of the two S-curves that bound the detector', () => {
    const { value } = pick(withParts({ limits: { acquisitionSymbols: 500 } }), 'acquisition.largest-offset');
    const omegaN = (2 * 0.01) / (1.5 * Math.SQRT1_2);
    const settling = 251;
    const offset = (meanSquare: number) =>
      (Math.sqrt((500 - settling) * 4 * Math.SQRT1_2 * omegaN ** 3 * meanSquare) / (2 * Math.PI)) * 27.5e6;
    expect(value).toBeGreaterThan(0.9 * offset(1 / 32));
    expect(value).toBeLessThan(1.1 * offset(0.1817));
  });

  it('name a bandwidth that acquires in the time allowed, as an estimate', () => {
    const found = pick(slow, 'acquisition.narrowest-bandwidth');
    expect(found).toMatchObject({ estimate: true, sense: 'min', stage: 'acquire' });
    const there = carrier(set(slow, '/carrier/stages/0/noiseBandwidth', found.value));
    const time = there.acquisition.pullInSymbols! + there.stages[0]!.settlingUpdates!;
    expect(time / 2000).toBeGreaterThan(0.7);
    expect(time / 2000).toBeLessThan(1.3);
  });

  it('has nothing to say of a time shorter than settling', () => {
    const { note } = pick(withParts({ limits: { acquisitionSymbols: 100 } }), 'acquisition.largest-offset');
    expect(note).toBe('Settling alone takes longer.');
  });
});

describe('drift solutions', () => {
  const drifting = withParts({ environment: { dopplerRateHzPerS: 1e9 } });

  // Published (F. Gardner, Phaselock Techniques): a ramp of R leaves R/g2.
  it('name the rate and the bandwidth that leave just the limit', () => {
    const limit = (3 * Math.PI) / 180;
    const { g2 } = carrier(drifting).stages[1]!.gains;
    const { value } = pick(drifting, 'drift.largest-rate');
    expect((2 * Math.PI * value!) / 27.5e6 ** 2 / g2).toBeCloseTo(limit, 12);
    const narrow = pick(drifting, 'drift.narrowest-bandwidth').value!;
    const theta = narrow / (1.5 * Math.SQRT1_2);
    const gain = (4 * theta ** 2) / (1 + Math.SQRT2 * theta + theta ** 2);
    expect((2 * Math.PI * 1e9) / 27.5e6 ** 2 / gain).toBeCloseTo(limit, 8);
  });

  it('are not there without drift', () => {
    expect(solutionsOf(withParts({})).some(({ slug }) => slug.startsWith('drift.'))).toBe(false);
  });
});

describe('the edit of a solution', () => {
  const plans: [string, Plan][] = [
    ['the sample', withParts({ limits: { phaseJitterDeg: 2.2, phaseMarginDeg: 50 } })],
    ['exact gains', withParts({ carrier: { method: 'exact', delay: 6 }, limits: { phaseMarginDeg: 50 } })],
    ['a drift', withParts({ environment: { dopplerRateHzPerS: 5e8 } })],
  ];

  it.each(plans)('is a plan that can be worked out: %s', (_, plan) => {
    for (const { change, slug } of solutionsOf(plan)) {
      if (change) expect(() => workOut(set(plan, change.pointer, change.value)), slug).not.toThrow();
    }
  });

  it.each(plans)('keeps the margin and the jitter: %s', (_, plan) => {
    for (const key of ['carrier', 'clock'] as const) {
      for (const slug of [
        'margin.widest-bandwidth',
        'margin.largest-delay',
        'jitter.widest-bandwidth',
        'jitter.narrowest-bandwidth',
      ]) {
        const found = solutionsOf(plan).find((each) => each.slug === slug && each.loop === key);
        if (!found?.change) continue;
        const there = workOut(set(plan, found.change.pointer, found.change.value))[key]!;
        const stage = there.stages.findIndex(({ name }) => name === found.stage);
        if (slug.startsWith('margin')) {
          expect(there.stages[stage]!.margins.phaseDeg, slug).toBeGreaterThanOrEqual(plan.limits!.phaseMarginDeg!);
        } else {
          expect(there.budget!.stages[stage]!.total, slug).toBeLessThanOrEqual(there.budget!.limit * 1.0005);
        }
      }
    }
  });
});
