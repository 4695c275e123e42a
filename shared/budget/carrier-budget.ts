import type { Budget, JitterSweep, StageJitter } from '../model/design';
import type { DetectorModel } from '../detectors/detector';
import { placedLoop } from '../loop/exact-gains';
import { bandwidthOverOmega, nominalGains, thetaOf } from '../loop/gains';
import { linearLoop } from '../loop/linear-loop';
import type { ThirdOrderForm } from '../loop/third-order-form';
import type { LinearLoop } from '../loop/linear-loop';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import { largestBetween } from '../math/root-search';
import { logarithmicPoints } from '../loop/frequency-response';
import { jitterVariance } from './jitter';
import type { JitterVariance } from './jitter';
import { phaseNoiseGrid } from './phase-noise';
import type { PhaseNoiseGrid, PhaseNoiseTable } from './phase-noise';

export interface BudgetInput {
  model: DetectorModel;
  /** Unquantised loops of the stages, and the names of the stages. */
  stages: { name: string; loop: LinearLoop }[];
  /** Damping factor of the last stage; 1 where the order has none. */
  damping: number;
  method: 'nominal' | 'exact';
  prewarp: boolean;
  /** Analog form of order 3. */
  form?: ThirdOrderForm;
  /** Symbols per update. */
  updateInterval: number;
  updateRateHz: number;
  phaseNoise: PhaseNoiseTable | undefined;
  /** Most jitter that the plan allows, degrees rms. */
  limit: number;
}

/** One bandwidth of the sweep. */
interface SweepPoint extends JitterVariance {
  /** BnT per symbol: asked for (nominal), or of the loop itself (exact). */
  noiseBandwidth: number;
}

const sweepPoints = 33;
const degrees = 180 / Math.PI;
/** Bandwidths over which the least jitter is sought, cycles per update. */
const [narrowest, widest] = [1e-6, 0.2];

/** Phase jitter of a carrier loop in degrees rms: every stage, and the last one over its bandwidth. */
export function carrierBudget(input: BudgetInput): Budget {
  const last = input.stages[input.stages.length - 1] as BudgetInput['stages'][number];
  const grid = input.phaseNoise
    ? phaseNoiseGrid(input.phaseNoise, last.loop, slowest(input), input.updateRateHz)
    : null;
  const own = noiseBandwidth(last.loop);
  const sweep = own === null ? [] : sweepAround(input, last.loop, own, grid);
  return {
    unit: 'deg',
    limit: input.limit,
    squaringLoss: null,
    boundRatio: null,
    drift: null,
    nco: null,
    implementationLoss: null,
    slip: null,
    stages: input.stages.map(({ name, loop }) =>
      stageJitter(name, jitterVariance(loop, input.model, input.updateInterval, grid)),
    ),
    sweep: toSweep(sweep),
    best: grid && last.loop.order > 1 ? leastJitter(input, last.loop, grid) : null,
  };
}

function slowest({ stages }: BudgetInput): number {
  return Math.min(...stages.map(({ loop: { gains } }) => Math.sqrt(gains.g2 || gains.g1 ** 2 || 1)), 1e-3);
}

function stageJitter(stage: string, variance: JitterVariance): StageJitter {
  const { thermal, oscillator, total } = variance;
  const none = { selfNoise: null, phaseQuantisation: null, wordQuantisation: null, drift: null };
  const dominant = thermal === null ? null : (oscillator ?? 0) > thermal ? 'oscillator' : 'thermal';
  return {
    stage,
    ...none,
    thermal: toDegrees(thermal),
    oscillator: toDegrees(oscillator),
    total: toDegrees(total),
    dominant,
  };
}

const toDegrees = (variance: number | null): number | null =>
  variance === null ? null : degrees * Math.sqrt(variance);

/** From a thirtieth of the stage's own bandwidth to ten times it, as far as the loop can go. */
function sweepAround(input: BudgetInput, like: LinearLoop, own: number, grid: PhaseNoiseGrid | null): SweepPoint[] {
  const points = logarithmicPoints(Math.max(own / 30, narrowest), Math.min(own * 10, widest), sweepPoints);
  return Array.from(points, (bandwidth) => sweepPoint(input, like, bandwidth, grid)).filter((point) => point !== null);
}

function sweepPoint(
  input: BudgetInput,
  like: LinearLoop,
  bandwidth: number,
  grid: PhaseNoiseGrid | null,
): SweepPoint | null {
  const loop = loopOfBandwidth(input, like, bandwidth);
  if (!loop) return null;
  const actual = input.method === 'exact' ? noiseBandwidth(loop) : bandwidth;
  if (actual === null) return null;
  return {
    noiseBandwidth: actual / input.updateInterval,
    ...jitterVariance(loop, input.model, input.updateInterval, grid),
  };
}

/** The last stage with another bandwidth: by the formula, or with its poles placed where the formula would have them. */
function loopOfBandwidth(
  { damping, method, prewarp, form }: BudgetInput,
  like: LinearLoop,
  bandwidth: number,
): LinearLoop | null {
  const omegaTu = bandwidth / bandwidthOverOmega(like.order, damping, form);
  if (prewarp && omegaTu >= Math.PI) return null;
  const theta = thetaOf(omegaTu, prewarp);
  const { order, delay, averaged } = like;
  if (method === 'exact' && order === 2) return placedLoop({ order, damping, delay, averaged }, theta);
  return linearLoop({ gains: nominalGains(order, { damping, theta, form }), delay, averaged });
}

function toSweep(points: SweepPoint[]): JitterSweep {
  const column = (of: (point: SweepPoint) => number | null) => points.map((point) => toDegrees(of(point)));
  return {
    noiseBandwidth: points.map((point) => point.noiseBandwidth),
    thermal: column(({ thermal }) => thermal),
    oscillator: column(({ oscillator }) => oscillator),
    selfNoise: column(() => null),
    phaseQuantisation: column(() => null),
    wordQuantisation: column(() => null),
    drift: column(() => null),
    total: column(({ total }) => total),
  };
}

/** The bandwidth with the least total; null where the least lies at an end of what is looked at. */
function leastJitter(input: BudgetInput, like: LinearLoop, grid: PhaseNoiseGrid): Budget['best'] {
  const at = (x: number): SweepPoint | null => sweepPoint(input, like, Math.exp(x), grid);
  const merit = (x: number): number => -(at(x)?.total ?? Infinity);
  const coarse = Array.from(logarithmicPoints(narrowest, widest, 22), Math.log);
  const merits = coarse.map(merit);
  const top = merits.indexOf(Math.max(...merits));
  if (!(top > 0 && top < coarse.length - 1 && Number.isFinite(merits[top]))) return null;
  const best = at(largestBetween(merit, coarse[top - 1] as number, coarse[top + 1] as number, 16).x);
  return best && best.total !== null
    ? { noiseBandwidth: best.noiseBandwidth, total: degrees * Math.sqrt(best.total) }
    : null;
}
