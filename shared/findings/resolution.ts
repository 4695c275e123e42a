import type { Finding } from '../model/design';
import { integralDeadBands } from '../fixed-point/dead-band';
import type { DeadBand } from '../fixed-point/dead-band';
import { errorLsb } from '../fixed-point/loop-scale';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { lastStage, numberOf, pointerOf, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { ncoFindings } from './nco-words';

/** Share of the jitter limit that a standing error may take unnoticed. */
const quietShare = 0.1;

/** What small words leave of errors and frequencies. */
export const resolutionFindings = (view: LoopView): Finding[] => [...deadBand(view), ...ncoFindings(view)];

/** Errors so small that they leave the integrator of an order-2 loop where it is. */
function deadBand(view: LoopView): Finding[] {
  if (view.loop.order < 2) return [];
  const at = lastStage(view);
  const standing = standingError(view, reachAt(view, at));
  const limit = view.key === 'carrier' ? view.plan.limits.phaseJitterDeg : view.plan.limits.timingJitterSymbols;
  const { value, reach } = standing;
  const severity = severityOf(standing, limit);
  return [
    finding({
      slug: 'resolution.integrator-dead-band',
      severity,
      title: passed(severity, `${view.title}: the integrator sees small errors`, titleOf(view, standing)),
      value,
      limit,
      sense: 'max',
      unit: view.key === 'carrier' ? '°' : 'symbols',
      reason: reasonOf(at, standing),
      ...remedyUnless(severity, () => moreGuardBits(view, reach)),
      fields: [pointerOf(view, 'arithmetic/guardBits'), pointerOf(view, 'arithmetic/errorBits')],
      source: 'dead band of the rounding, exact',
    }),
  ];
}

function severityOf({ cause, value }: Standing, limit: number): Severity {
  if (cause === 'stuck') return 'fail';
  if (value <= quietShare * limit) return 'pass';
  return value > limit ? 'fail' : 'caution';
}

/** What the rounding of the increments leaves of an error. */
interface Standing {
  /** Largest error word that moves nothing; beyond the error word itself where none does. */
  reach: number;
  /** The same, degrees or symbols. */
  band: number;
  /** Error that stands, likewise. */
  value: number;
  /** `stuck`: no error moves the integrator · `carried`: noise carries small errors over · `pull`: floor rounds them all down. */
  cause: 'stuck' | 'carried' | 'pull' | 'band';
}

/** Noise that is larger than the band averages it out; with floor half of the band is left, the pull of half an LSB. */
function standingError(view: LoopView, reach: number): Standing {
  const { errorBits, rounding } = view.loop.arithmetic;
  const largest = 2 ** (errorBits - 1);
  const band = Math.min(reach, largest) * lsbOfOffset(view);
  if (reach >= largest - 1) return { reach, band, value: band, cause: 'stuck' };
  if (!isDithered(view, reach)) return { reach, band, value: band, cause: 'band' };
  return rounding === 'floor'
    ? { reach, band, value: band / 2, cause: 'pull' }
    : { reach, band, value: 0, cause: 'carried' };
}

/** Largest error word that leaves the integrator where it is, as if the error word had no end. */
function reachAt({ design: { words } }: LoopView, { index }: StageView): number {
  const isNone = words.stages[index]?.integral.mantissa === 0;
  const bands = integralDeadBands(isNone ? words : { ...words, errorBits: 64 });
  const { least, most } = bands[index] as DeadBand;
  return Math.max(-least, most);
}

/** One error LSB as degrees or symbols at lock. */
function lsbOfOffset({ key, loop, design }: LoopView): number {
  const perLsb = errorLsb(loop.arithmetic) / design.detector.gain;
  return key === 'carrier' ? (perLsb * 180) / Math.PI : perLsb;
}

/** Noise that is larger than the dead band carries small errors over it. */
function isDithered({ loop, design: { detector } }: LoopView, reach: number): boolean {
  return detector.variance !== null && Math.sqrt(detector.variance) > reach * errorLsb(loop.arithmetic);
}

function titleOf({ title }: LoopView, { cause }: Standing): string {
  if (cause === 'stuck') return `${title}: the integrator never moves`;
  return cause === 'pull' ? `${title}: rounding pulls the integrator` : `${title}: small errors never integrate`;
}

function reasonOf(at: StageView, { cause, reach, band, value }: Standing): string {
  const name = stageName(at);
  const amount = (of: number): string => (at.key === 'carrier' ? `${say(of)}°` : `${say(of)} symbols`);
  const rounded = at.loop.arithmetic.rounding === 'floor' ? '0 or −1' : '0';
  if (reach === 0) return `${name} moves its integrator for every error but 0.`;
  switch (cause) {
    case 'stuck':
      return `${name} rounds every increment to ${rounded}: the loop has silently lost its integrator and keeps a standing error.`;
    case 'pull':
      return `${name} rounds its increments down, half an LSB on average: a standing error of ${amount(value)} makes up for it.`;
    case 'carried':
      return `${name} rounds increments of up to ${amount(band)} to 0; its noise is larger and carries them over.`;
    case 'band':
      return `${name} rounds increments of up to ${amount(band)} to 0. An error that small stands for ever unless noise carries it over.`;
  }
}

/** Each guard bit halves the dead band; the integrator must keep the range that it needs. */
function moreGuardBits(view: LoopView, reach: number): Remedy | null {
  const { guardBits, integratorBits } = view.loop.arithmetic;
  const more = Math.ceil(Math.log2(reach + 1));
  const spare = view.design.headroom.find(({ node }) => node === 'integrator')?.headroomBits ?? Infinity;
  const path = 'arithmetic/guardBits';
  if (spare >= more && guardBits + more < integratorBits) {
    return setTo(numberOf(view, path), pointerOf(view, path), guardBits + more, `${guardBits + more} bits`);
  }
  return {
    remedy: `Widen ${numberOf(view, 'arithmetic/integratorBits')} and ${numberOf(view, path)} by ${more} bits each.`,
    change: null,
  };
}
