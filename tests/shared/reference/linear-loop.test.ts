import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { StageDesign } from '../../../shared/model/design';
import { filled } from '../sample-plan';

/*
 * Values of Debian's numpy, scipy and mpmath for random plans, made by tests/reference/linear_loop.py from the
 * definitions of the loop. What it ran on stands at the head of the file.
 */
interface LoopCase {
  order: 1 | 2 | 3;
  updateInterval: number;
  delay: number;
  prewarp: boolean;
  noiseBandwidth: number;
  damping?: number;
  thirdOrder?: { a3: number; b3: number };
  gains: [number, number, number];
  /** Slowest first, upper half-plane and real axis, six at most. */
  poles: [number, number][];
  stable: boolean;
  exact?: number;
  phaseDeg?: number;
  gainUp?: number | null;
  gainDown?: number | null;
  largestDelay?: number;
  peakingDb?: number;
  bandwidth3Db?: number | null;
  settlingUpdates?: number;
  overshoot?: number;
  frequencyPeak?: number;
}

interface Reference {
  loops: LoopCase[];
  exact: Pick<Required<LoopCase>, 'damping' | 'delay' | 'updateInterval' | 'noiseBandwidth' | 'gains'>[];
  phaseNoise: {
    symbolRateBd: number;
    phaseNoise: [number, number][];
    damping: number;
    delay: number;
    noiseBandwidth: number;
    oscillatorDeg: number;
  }[];
}

const reference = JSON.parse(
  readFileSync(new URL('../../reference/linear-loop.json', import.meta.url), 'utf8'),
) as Reference;

function planOf(carrier: object, symbolRateBd = 1e6, environment: object = {}) {
  const plan = { name: 'Reference', target: 'any', signal: { symbolRateBd }, environment };
  return filled({ ...plan, carrier: { nco: { stepsPerSymbol: 4 }, ...carrier } });
}

type Described = { damping?: number | undefined; noiseBandwidth: number; [key: string]: unknown };

function stageOf({ damping, noiseBandwidth, ...loop }: Described): StageDesign {
  const stage = { name: 'only', noiseBandwidth, ...(damping === undefined ? {} : { damping }) };
  return workOut(planOf({ ...loop, stages: [stage] })).carrier!.stages[0]!;
}

const designs = reference.loops.map(({ order, updateInterval, delay, prewarp, noiseBandwidth, damping, thirdOrder }) =>
  stageOf({ order, updateInterval, delay, prewarp, noiseBandwidth, damping, ...(thirdOrder ? { thirdOrder } : {}) }),
);

/** Every case that has a value, with the design beside it; the label finds a failing one again. */
function each<K extends keyof LoopCase>(
  key: K,
  check: (wanted: NonNullable<LoopCase[K]>, design: StageDesign, label: string) => void,
) {
  let seen = 0;
  reference.loops.forEach((one, i) => {
    const wanted = one[key];
    if (wanted === undefined || wanted === null) return;
    check(wanted, designs[i]!, `case ${i}: ${JSON.stringify({ ...one, poles: undefined })}`);
    seen += 1;
  });
  expect(seen).toBeGreaterThan(30);
}

const relative = (value: number | null | undefined, wanted: number): number => Math.abs((value ?? NaN) / wanted - 1);

describe('the linear loop against numpy, scipy and mpmath', () => {
  it('covers 340 plans', () => {
    expect(reference.loops).toHaveLength(340);
  });

  it('has their gains', () => {
    each('gains', ([g1, g2, g3], { gains }, label) => {
      expect(relative(gains.g1, g1), label).toBeLessThan(1e-12);
      if (g2 !== 0) expect(relative(gains.g2, g2), label).toBeLessThan(1e-12);
      if (g3 !== 0) expect(relative(gains.g3, g3), label).toBeLessThan(1e-12);
    });
  });

  // Two poles that all but meet are ill-conditioned: √ε of their distance.
  it('has their poles', () => {
    each('poles', (poles, design, label) => {
      for (const [re, im] of poles) {
        const distance = Math.min(...design.poles.map(([x, y]) => Math.hypot(x! - re, y! - im)));
        expect(distance, label).toBeLessThan(1e-9 + 1e-6 * Math.hypot(re - 1, im));
      }
    });
  });

  it('is stable where they are', () => {
    each('stable', (stable, design, label) => expect(design.stable, label).toBe(stable));
  });

  it('has their noise bandwidth', () => {
    each('exact', (exact, design, label) =>
      expect(relative(design.noiseBandwidth.exact, exact), label).toBeLessThan(1e-9),
    );
  });

  it('has their margins and largest delay', () => {
    each('phaseDeg', (phaseDeg, { margins }, label) =>
      expect(Math.abs(margins.phaseDeg! - phaseDeg), label).toBeLessThan(1e-6),
    );
    each('gainUp', (gainUp, { margins }, label) => expect(relative(margins.gainUp, gainUp), label).toBeLessThan(1e-7));
    each('gainDown', (gainDown, { margins }, label) =>
      expect(relative(margins.gainDown, gainDown), label).toBeLessThan(1e-7),
    );
    each('largestDelay', (largestDelay, design, label) => expect(design.largestDelay, label).toBe(largestDelay));
  });

  it('has their peak and 3 dB bandwidth', () => {
    each('peakingDb', (peakingDb, design, label) =>
      expect(Math.abs(design.peakingDb! - peakingDb), label).toBeLessThan(1e-6),
    );
    each('bandwidth3Db', (bandwidth, design, label) =>
      expect(relative(design.bandwidth3Db, bandwidth), label).toBeLessThan(1e-7),
    );
  });

  it('has their responses to a phase step and a frequency step', () => {
    each('settlingUpdates', (settling, design, label) => expect(design.settlingUpdates, label).toBe(settling));
    each('overshoot', (overshoot, design, label) =>
      expect(Math.abs(design.overshoot! - overshoot), label).toBeLessThan(1e-8),
    );
    each('frequencyPeak', (peak, design, label) =>
      expect(relative(design.frequencyStep?.peak, peak), label).toBeLessThan(1e-7),
    );
  });

  // Solved by scipy.optimize.root for damping and bandwidth together, to 1e−11 of each.
  it('finds their gains where bandwidth and damping are asked exactly, delay included', () => {
    expect(reference.exact.length).toBeGreaterThanOrEqual(40);
    for (const { gains, ...parts } of reference.exact) {
      const design = stageOf({ ...parts, method: 'exact' });
      expect(relative(design.gains.g1, gains[0]), JSON.stringify(parts)).toBeLessThan(1e-8);
      expect(relative(design.gains.g2, gains[1]), JSON.stringify(parts)).toBeLessThan(1e-8);
    }
  });

  // scipy.integrate.quad between the points of the table, 1e−9; the engine's grid is held to half a percent.
  it('has their integral of the phase noise that the loop does not follow', () => {
    for (const { symbolRateBd, phaseNoise, oscillatorDeg, delay, ...stage } of reference.phaseNoise) {
      const plan = planOf({ delay, stages: [{ name: 'only', ...stage }] }, symbolRateBd, { phaseNoise });
      const { oscillator } = workOut(plan).carrier!.budget!.stages[0]!;
      expect(relative(oscillator, oscillatorDeg), JSON.stringify(stage)).toBeLessThan(0.005);
    }
  });
});
