import type { CarrierLoop, ClockLoop, Plan } from '../model/plan';

const nodes = ['sample', 'error', 'proportional', 'increment', 'integrator', 'increment2', 'integrator2'] as const;
type Overflow = 'saturate' | 'wrap';

/** Keys that stay optional because their absence means something. */
type Optional = 'ringRatios' | 'integratorLimitHz' | 'integratorLimitPpm' | 'carrierFrequencyHz' | 'phaseNoise';
type Filled<T> = { [K in keyof T as K extends Optional ? never : K]-?: NonNullable<T[K]> } & {
  [K in keyof T as K extends Optional ? K : never]?: T[K];
};

export interface CompleteStage {
  name: string;
  /** Order 2 only. */
  damping?: number;
  noiseBandwidth?: number;
  naturalFrequencyHz?: number;
  until?: { symbols?: number; lockMetric?: number };
}

type CompleteLoop<T extends CarrierLoop | ClockLoop> = Omit<
  Filled<T>,
  'stages' | 'thirdOrder' | 'arithmetic' | 'lockDetector'
> & {
  stages: CompleteStage[];
  thirdOrder: Filled<NonNullable<T['thirdOrder']>>;
  arithmetic: Omit<Filled<NonNullable<T['arithmetic']>>, 'overflow'> & {
    overflow: Record<(typeof nodes)[number], Overflow>;
  };
  lockDetector: Filled<NonNullable<T['lockDetector']>>;
};

export type CompleteCarrier = Omit<CompleteLoop<CarrierLoop>, 'nco'> & { nco: Filled<NonNullable<CarrierLoop['nco']>> };
export type CompleteClock = Omit<CompleteLoop<ClockLoop>, 'counter'> & {
  counter: Filled<NonNullable<ClockLoop['counter']>>;
};

export interface Environment {
  carrierFrequencyHz?: number;
  carrierTolerancePpm: number;
  dopplerHz: number;
  dopplerRateHzPerS: number;
  clockTolerancePpm: number;
  /** [offset Hz, dBc/Hz], offsets rising. */
  phaseNoise?: [number, number][];
}

/** A plan in which every value that has a default is present. */
export interface CompletePlan {
  name: string;
  target: string;
  signal: Filled<Plan['signal']>;
  carrier?: CompleteCarrier;
  clock?: CompleteClock;
  environment: Environment;
  limits: Filled<NonNullable<Plan['limits']>>;
}

/**
 * Fills what the schema's own defaults cannot: the damping factor 1/√2 of a stage of order 2, and the overflow of
 * each node. The plan has been validated, and its schema defaults filled, before.
 */
export function completePlan(plan: Plan): CompletePlan {
  const complete = structuredClone(plan) as unknown as CompletePlan;
  for (const loop of [complete.carrier, complete.clock]) {
    if (!loop) continue;
    if (loop.order === 2) for (const stage of loop.stages) stage.damping ??= Math.SQRT1_2;
    loop.arithmetic.overflow = overflowOfEach(loop.arithmetic.overflow);
  }
  return complete;
}

function overflowOfEach(
  overflow: Overflow | Partial<Record<string, Overflow>>,
): Record<(typeof nodes)[number], Overflow> {
  const of = (node: string): Overflow => (typeof overflow === 'string' ? overflow : (overflow[node] ?? 'saturate'));
  return Object.fromEntries(nodes.map((node) => [node, of(node)])) as Record<(typeof nodes)[number], Overflow>;
}
