import type { BestBandwidth, JitterSweep } from '../model/design';
import { logarithmicPoints } from '../loop/frequency-response';
import { swiftNoiseBandwidth } from '../loop/swift-noise-bandwidth';
import { jitterTerms } from './jitter';
import type { Disturbances, JitterTerms } from './jitter';
import { loopOfBandwidth } from './loop-family';
import type { LoopFamily } from './loop-family';
import { swiftLoopVariances } from './swift-loop-variances';

/** One bandwidth of a sweep. */
export interface SweepPoint {
  /** Nominal noise bandwidth, cycles per update. */
  nominal: number;
  /** BnT per symbol: asked for (nominal), or of the loop itself (exact). */
  noiseBandwidth: number;
  terms: JitterTerms;
}

export interface SweepInput {
  family: LoopFamily;
  disturbances: Disturbances;
  /** Noise bandwidth of the stage's own loop, cycles per update. */
  own: number;
}

/** Neighbouring points of a sweep, bandwidths rising. */
type Three = [SweepPoint, SweepPoint, SweepPoint];

const sweepPoints = 25;
const coarsePoints = 13;
const rounds = 4;
/** Bandwidths over which the least jitter is sought, cycles per update. */
export const [narrowest, widest] = [1e-6, 0.2];

/** From a thirtieth of the stage's own bandwidth to ten times it, as far as the loop can go. */
export function sweepAround(input: SweepInput): SweepPoint[] {
  const [low, high] = [Math.max(input.own / 30, narrowest), Math.min(input.own * 10, widest)];
  if (!(low < high)) return [];
  return Array.from(logarithmicPoints(low, high, sweepPoints), (bandwidth) => sweepPoint(input, bandwidth)).filter(
    (point) => point !== null,
  );
}

function sweepPoint({ family, disturbances }: SweepInput, bandwidth: number): SweepPoint | null {
  const loop = loopOfBandwidth(family, bandwidth);
  if (!loop) return null;
  const actual = family.method === 'exact' ? swiftNoiseBandwidth(loop) : bandwidth;
  if (actual === null) return null;
  return {
    nominal: bandwidth,
    noiseBandwidth: actual / disturbances.updateInterval,
    terms: jitterTerms(loop, disturbances, swiftLoopVariances),
  };
}

/** @param scale the sheet's unit over that of the phase */
export function toSweep(points: SweepPoint[], scale: number): JitterSweep {
  const column = (term: keyof JitterTerms) => points.map(({ terms }) => rms(terms[term], scale));
  return {
    noiseBandwidth: points.map((point) => point.noiseBandwidth),
    thermal: column('thermal'),
    selfNoise: column('selfNoise'),
    oscillator: column('oscillator'),
    phaseQuantisation: column('phaseQuantisation'),
    wordQuantisation: column('wordQuantisation'),
    drift: column('drift'),
    total: column('total'),
  };
}

export const rms = (variance: number | null, scale: number): number | null =>
  variance === null ? null : scale * Math.sqrt(variance);

/**
 * The bandwidth with the least total: of all bandwidths where an oscillator or a drift asks for a wide loop, of those that
 * are swept where only the words do.
 *
 * @returns null where the least lies at an end of what is looked at
 */
export function leastJitter(input: SweepInput, swept: SweepPoint[], scale: number): BestBandwidth | null {
  const { phaseNoise, drift } = input.disturbances;
  const points = phaseNoise || drift ? [...swept, ...coarse(input, swept)].sort(byBandwidth) : swept;
  const known = points.filter(({ terms }) => terms.total !== null);
  const top = known.reduce((best, point, i) => (totalOf(point) < totalOf(known[best]!) ? i : best), 0);
  if (top <= 0 || top >= known.length - 1) return null;
  const best = refined(input, [known[top - 1]!, known[top]!, known[top + 1]!]);
  return { noiseBandwidth: best.noiseBandwidth, total: scale * Math.sqrt(totalOf(best)) };
}

const byBandwidth = (one: SweepPoint, other: SweepPoint): number => one.nominal - other.nominal;
const totalOf = ({ terms }: SweepPoint): number => terms.total as number;

/** The bandwidths beside those that are swept. */
function coarse(input: SweepInput, swept: SweepPoint[]): SweepPoint[] {
  const [first, last] = [swept[0]?.nominal ?? Infinity, swept.at(-1)?.nominal ?? -Infinity];
  return [...logarithmicPoints(narrowest, widest, coarsePoints)]
    .filter((bandwidth) => bandwidth < first || bandwidth > last)
    .map((bandwidth) => sweepPoint(input, bandwidth))
    .filter((point) => point !== null);
}

/** Closes in on the least total by parabolas over the logarithm of the bandwidth through three points with the least one in the middle. */
function refined(input: SweepInput, start: Three): SweepPoint {
  let three = start;
  for (let round = 0; round < rounds; round += 1) {
    const next = sweepPoint(input, Math.exp(vertexOf(three)));
    if (next?.terms.total == null) break;
    three = narrowed(three, next);
  }
  return three[1];
}

/** ln of the vertex's bandwidth, not so near to the middle that the next parabola would be none. */
function vertexOf(three: Three): number {
  const [a, b, c] = three.map((point) => Math.log(point.nominal)) as [number, number, number];
  const [fa, fb, fc] = three.map((point) => Math.log(totalOf(point))) as [number, number, number];
  const [left, right] = [(b - a) * (fb - fc), (b - c) * (fb - fa)];
  const vertex = b - ((b - a) * left - (b - c) * right) / (2 * (left - right));
  const least = 1e-3 * (c - a);
  if (!(vertex > a && vertex < c)) return (b - a > c - b ? a + b : b + c) / 2;
  return Math.abs(vertex - b) < least ? b + (b - a > c - b ? -least : least) : vertex;
}

function narrowed([a, b, c]: Three, next: SweepPoint): Three {
  const left = next.nominal < b.nominal;
  if (totalOf(next) < totalOf(b)) return left ? [a, next, b] : [b, next, c];
  return left ? [next, b, c] : [a, b, next];
}
