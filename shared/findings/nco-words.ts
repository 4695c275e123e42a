import type { Finding } from '../model/design';
import type { CompleteCarrier, CompleteClock } from '../plan/complete';
import { finding, followedBy, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { lastStage, numberOf, pointerOf, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';

/** What a spur keeps below the noise of one symbol, dB. */
const belowNoiseDb = 20;
/** One step of the frequency word may be worth this part of the jitter limit. */
const quietPart = 10;
const mostPhaseBits = 16;

/** What the bits of the oscillator leave. */
export const ncoFindings = (view: LoopView): Finding[] => [...spur(view), ...frequencyStep(view)];

function spur(view: LoopView): Finding[] {
  const value = view.design.budget?.nco?.worstSpurDbc ?? null;
  if (value === null) return [];
  const { esN0Db } = view.plan.signal;
  const limit = -(esN0Db + belowNoiseDb);
  const severity: Severity = value > limit ? 'caution' : 'pass';
  const { phaseBits, widthBits } = (view.loop as CompleteCarrier).nco;
  return [
    finding({
      slug: 'resolution.spur',
      severity,
      title: passed(severity, 'Spurs of the NCO stay low', 'Too few phase bits make spurs'),
      value,
      limit,
      sense: 'max',
      unit: 'dBc',
      reason: `${phaseBits} phase bits (${numberOf(view, 'nco/phaseBits')}) leave a spur of up to ${say(value)} dBc; ${belowNoiseDb} dB below the noise of a symbol is ${say(limit)} dBc.`,
      ...remedyUnless(severity, () => morePhaseBits(view, limit, widthBits)),
      fields: [pointerOf(view, 'nco/phaseBits'), '/signal/esN0Db'],
      source: 'H. Nicholas, H. Samueli 1987; 20 dB below the noise is common practice',
    }),
  ];
}

/** Each bit takes 6.02 dB off a spur that is never worse than −6.02·P + 3.93 dBc. */
function morePhaseBits(view: LoopView, limit: number, widthBits: number): Remedy | null {
  const bits = Math.ceil((3.93 - limit) / (20 * Math.log10(2)));
  const path = 'nco/phaseBits';
  return bits <= Math.min(mostPhaseBits, widthBits)
    ? setTo(numberOf(view, path), pointerOf(view, path), bits, `${bits} bits`)
    : null;
}

/** The proportional path moves the frequency word by whole steps: one is worth K0/g1 of phase. */
function frequencyStep(view: LoopView): Finding[] {
  const at = lastStage(view);
  const { limit: jitter, unit, pointer } = jitterLimit(view);
  const value = stepWorth(at);
  if (value === null) return [];
  const limit = jitter / quietPart;
  const severity: Severity = value > jitter ? 'fail' : value > limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'resolution.frequency',
      severity,
      title: passed(severity, `${view.title} steers finely enough`, `${view.title} steers in coarse steps`),
      value,
      limit,
      sense: 'max',
      unit,
      reason: `${stageName(at)} moves its output by one LSB for ${say(value)} ${unit === '°' ? 'degrees' : unit} of error; smaller errors wait, and the loop wanders between two steps.`,
      ...remedyUnless(severity, () => widerOutput(view, value / limit)),
      fields: [outputPath(view), pointer],
      source: 'one output LSB over g1, exact; a tenth of the limit is common practice',
    }),
  ];
}

const stepWorth = ({ key, design, result }: StageView): number | null => {
  const { g1 } = result.gains;
  if (!(g1 > 0)) return null;
  const offset = design.detector.oscillatorGain / g1;
  return key === 'carrier' ? (offset * 180) / Math.PI : offset;
};

const jitterLimit = ({ key, plan: { limits } }: LoopView) =>
  key === 'carrier'
    ? { limit: limits.phaseJitterDeg, unit: '°', pointer: '/limits/phaseJitterDeg' }
    : { limit: limits.timingJitterSymbols, unit: 'symbols', pointer: '/limits/timingJitterSymbols' };

const outputPath = (view: LoopView): string =>
  pointerOf(view, view.key === 'carrier' ? 'nco/widthBits' : 'counter/widthBits');

/** Each bit halves the step; the integrator, whose LSB shrinks as well, needs the same bits more. */
function widerOutput(view: LoopView, over: number): Remedy | null {
  const more = Math.ceil(Math.log2(over));
  const path = view.key === 'carrier' ? 'nco/widthBits' : 'counter/widthBits';
  const { widthBits } =
    view.key === 'carrier' ? (view.loop as CompleteCarrier).nco : (view.loop as CompleteClock).counter;
  const bits = widthBits + more;
  if (bits > (view.key === 'carrier' ? 64 : 48)) return null;
  const { integratorBits } = view.loop.arithmetic;
  return followedBy(
    setTo(numberOf(view, path), pointerOf(view, path), bits, `${bits} bits`),
    `${numberOf(view, 'arithmetic/integratorBits')} to ${Math.min(64, integratorBits + more)} bits`,
  );
}
