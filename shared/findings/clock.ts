import type { Finding } from '../model/design';
import { gardnerSlope } from '../detectors/clock';
import type { ClockWords } from '../fixed-point/words';
import { largestErrorHeldPpm } from '../fixed-point/clock-headroom';
import { finding, passed, remedyUnless, say } from './finding';
import type { Severity } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';
import { interpolatorFindings } from './interpolator';
import { widerIntegrator } from './wider-integrator';

/** Half of the slope at roll-off 0.2. */
const leastSlope = 0.3;

/** What only a clock loop can get wrong. */
export function clockFindings(view: LoopView): Finding[] {
  return view.key === 'clock' ? [...ppmRange(view), ...slope(view), ...interpolatorFindings(view)] : [];
}

function ppmRange(view: LoopView): Finding[] {
  const { offsetPpm, largestOffsetPpm } = view.design.acquisition;
  if (offsetPpm === null || largestOffsetPpm === null || view.loop.order < 2) return [];
  const severity: Severity = largestOffsetPpm < offsetPpm ? 'fail' : 'pass';
  const path = limitPpm(view) === undefined ? 'arithmetic/integratorBits' : 'arithmetic/integratorLimitPpm';
  return [
    finding({
      slug: 'clock.ppm-range',
      severity,
      title: passed(severity, 'The integrator reaches the clock error', 'The integrator stops short of the clock'),
      value: largestOffsetPpm,
      limit: offsetPpm,
      sense: 'min',
      unit: 'ppm',
      reason: `${numberOf(view, path)} holds ±${say(largestOffsetPpm)} ppm; both ends together can be ±${say(offsetPpm)} ppm off (4.5).${severity === 'pass' ? '' : ' Beyond that the strobe slips for ever.'}`,
      ...remedyUnless(severity, () =>
        widerIntegrator(view, {
          asked: offsetPpm,
          word: wordRangePpm(view),
          limit: limitPpm(view),
          limitPath: 'arithmetic/integratorLimitPpm',
          text: (value) => `±${say(value)} ppm`,
        }),
      ),
      fields: [pointerOf(view, path), '/environment/clockTolerancePpm'],
      source: 'follows from the datapath, exact',
    }),
  ];
}

const limitPpm = ({ loop }: LoopView): number | undefined =>
  (loop.arithmetic as { integratorLimitPpm?: number }).integratorLimitPpm;

/** What the integrator's word alone would hold, ppm. */
const wordRangePpm = ({ design, plan }: LoopView): number =>
  largestErrorHeldPpm({ ...(design.words as ClockWords), integratorLimit: null }, plan.signal.samplesPerSymbol);

/** Of the Gardner detector; the slopes of detectors that decide stay. */
function slope(view: LoopView): Finding[] {
  if (view.design.detector.name !== 'gardner') return [];
  const { rollOff } = view.plan.signal;
  const value = gardnerSlope(rollOff);
  const severity: Severity = value < leastSlope ? 'caution' : 'pass';
  return [
    finding({
      slug: 'clock.slope',
      severity,
      title: passed(severity, 'The timing detector has slope enough', 'The timing detector’s slope nearly vanishes'),
      value,
      limit: leastSlope,
      sense: 'min',
      unit: 'per symbol',
      reason: `At roll-off ${say(rollOff)} (1.4) the Gardner detector has a slope of ${say(value)} per symbol at unit amplitude. Its own pattern noise does not fall with it.`,
      ...remedyUnless(severity, () => ({
        remedy: 'Take a wider roll-off, or a narrower clock loop.',
        change: null,
      })),
      fields: ['/signal/rollOff', pointerOf(view, 'detector')],
      source: 'F. Gardner 1986; the limit is common practice',
    }),
  ];
}
