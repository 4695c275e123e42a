import type { DetectorNull, Finding } from '../model/design';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** Slope with noise over slope without, below which the gain hangs on Es/N0: 6 dB. */
const leastSlopeLeft = 0.5;

/** What the S-curve itself gets wrong. */
export const detectorFindings = (view: LoopView): Finding[] => [...falseNulls(view), ...slopeWithNoise(view)];

function falseNulls(view: LoopView): Finding[] {
  const { nulls, name } = view.design.detector;
  if (nulls.length === 0) return [];
  const nearest = nearestFalse(nulls);
  const severity: Severity = nearest === null ? 'pass' : 'caution';
  const place = nearest === null ? '' : placeOf(view, nearest);
  return [
    finding({
      slug: 'detector.false-null',
      severity,
      title: passed(severity, `${view.title} rests at lock alone`, `${view.title} can rest off lock`),
      value: nearest === null ? null : scaled(view, nearest),
      unit: nearest === null ? '' : view.key === 'carrier' ? '°' : 'symbols',
      reason:
        nearest === null
          ? `The S-curve of ${name} has one stable zero in a period, at this noise.`
          : `The S-curve of ${name} on ${view.plan.signal.modulation} has a stable zero ${place} off. A loop that starts near it settles there, with a quiet error and wrong symbols.`,
      ...remedyUnless(severity, () => ({
        remedy: 'Start on known symbols, or turn the phase until the decoder agrees.',
        change: null,
      })),
      fields: [pointerOf(view, 'detector'), '/signal/modulation', '/signal/esN0Db'],
      source: 'zeros of the S-curve with noise, exact',
    }),
  ];
}

/** Distance of the nearest stable zero that is not lock. */
function nearestFalse(nulls: readonly DetectorNull[]): number | null {
  const places = nulls.filter(({ stable, lock }) => stable && !lock).map(({ x }) => Math.abs(x));
  return places.length ? Math.min(...places) : null;
}

const scaled = ({ key }: LoopView, x: number): number => (key === 'carrier' ? (x * 180) / Math.PI : x);

const placeOf = (view: LoopView, x: number): string =>
  view.key === 'carrier' ? `${say(scaled(view, x))}°` : `${say(x)} symbols`;

function slopeWithNoise(view: LoopView): Finding[] {
  const { gain, gainWithoutNoise, name } = view.design.detector;
  if (!(gainWithoutNoise > 0)) return [];
  const value = gain / gainWithoutNoise;
  const severity: Severity = value < leastSlopeLeft ? 'caution' : 'pass';
  return [
    finding({
      slug: 'detector.slope-with-noise',
      severity,
      title: passed(severity, `${view.title} keeps its slope in noise`, `${view.title} loses its slope in noise`),
      value,
      limit: leastSlopeLeft,
      sense: 'min',
      reason: `At ${say(view.plan.signal.esN0Db)} dB (1.5) wrong decisions leave ${name} ${say(100 * value)} % of its slope: when the noise falls the loop’s gain rises by up to ${say(-20 * Math.log10(value))} dB, and ζ and BnT with it.`,
      ...remedyUnless(severity, () => steadierDetector(view)),
      fields: [pointerOf(view, 'detector'), '/signal/esN0Db'],
      source: 'slope of the S-curve with noise over that without; 6 dB is common practice',
    }),
  ];
}

/** Detectors without decisions have the same mean slope in any noise; Gardner’s wants two samples per symbol. */
function steadierDetector(view: LoopView): Remedy {
  const { modulation, samplesPerSymbol } = view.plan.signal;
  const steady = view.key === 'carrier' ? steadyPhase[modulation] : samplesPerSymbol >= 2 ? 'gardner' : undefined;
  return steady === undefined
    ? {
        remedy: 'Take a stage for each range of Es/N0 (1.5), or known symbols where the waveform has them.',
        change: null,
      }
    : setTo(numberOf(view, 'detector'), pointerOf(view, 'detector'), steady, steady);
}

const steadyPhase: Record<string, string | undefined> = { BPSK: 'costas', QPSK: 'power-law' };
