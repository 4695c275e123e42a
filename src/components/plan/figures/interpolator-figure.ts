import type { LoopDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { pointsOf, type Figure } from './figure';

/** Fig. 10 of a clock loop: how far the interpolator is off over the band. */
export function interpolatorFigure({ interpolator }: LoopDesign): Figure | undefined {
  if (!interpolator) return undefined;
  const { frequency, errorDb, bandEdge, worstErrorDb, signalOverErrorDb } = interpolator;
  const points = pointsOf(frequency, errorDb);
  return {
    title: 'Error of the interpolator, dB',
    file: 'interpolator',
    x: { label: 'frequency', unit: 'cycles per sample' },
    y: { label: 'error, dB', domain: [Math.min(-80, ...points.map(([, y]) => Math.max(y, -140))), 0] },
    series: [{ label: 'rms over the fractions', tone: 'track', points }],
    limits: [{ at: bandEdge, label: 'band edge', axis: 'x', tone: 'soft' }],
    caption: `The signal is ${numberText(signalOverErrorDb, { decimals: 1 })} dB above the error for random data; at worst in the band the error is ${numberText(worstErrorDb, { decimals: 1 })} dB.`,
  };
}
