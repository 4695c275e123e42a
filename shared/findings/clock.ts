import type { Finding } from '../model/design';
import { gardnerSlope } from '../detectors/clock';
import { finding, passed, remedyUnless, say, setTo, twoDigitsUp } from './finding';
import type { Remedy, Severity } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** Half of the slope at roll-off 0.2. */
const leastSlope = 0.3;

/** What only a clock loop can get wrong. */
export function clockFindings(view: LoopView): Finding[] {
  return view.key === 'clock' ? [...ppmRange(view), slope(view)] : [];
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
      ...remedyUnless(severity, () => widerIntegrator(view, { asked: offsetPpm, held: largestOffsetPpm })),
      fields: [pointerOf(view, path), '/environment/clockTolerancePpm'],
      source: 'follows from the datapath, exact',
    }),
  ];
}

const limitPpm = ({ loop }: LoopView): number | undefined =>
  (loop.arithmetic as { integratorLimitPpm?: number }).integratorLimitPpm;

function widerIntegrator(view: LoopView, { asked, held }: { asked: number; held: number }): Remedy | null {
  if (limitPpm(view) !== undefined) {
    const value = twoDigitsUp(1.1 * asked);
    const path = 'arithmetic/integratorLimitPpm';
    return setTo(numberOf(view, path), pointerOf(view, path), value, `±${say(value)} ppm`);
  }
  const path = 'arithmetic/integratorBits';
  const bits = view.loop.arithmetic.integratorBits + Math.max(1, Math.ceil(Math.log2(asked / held)));
  return bits <= 64 ? setTo(numberOf(view, path), pointerOf(view, path), bits, `${bits} bits`) : null;
}

function slope(view: LoopView): Finding {
  const { rollOff } = view.plan.signal;
  const value = gardnerSlope(rollOff);
  const severity: Severity = value < leastSlope ? 'caution' : 'pass';
  return finding({
    slug: 'clock.slope',
    severity,
    title: passed(severity, 'The timing detector has slope enough', 'The timing detector’s slope nearly vanishes'),
    value,
    limit: leastSlope,
    sense: 'min',
    unit: 'per symbol',
    reason: `At roll-off ${say(rollOff)} (1.4) the Gardner detector has a slope of ${say(value)} per symbol at unit amplitude. Its own pattern noise does not fall with it.`,
    ...remedyUnless(severity, () => ({
      remedy: 'Take a wider roll-off, or a narrower clock loop than the budget says.',
      change: null,
    })),
    fields: ['/signal/rollOff', pointerOf(view, 'detector')],
    source: 'F. Gardner 1986; the limit is common practice',
  });
}
