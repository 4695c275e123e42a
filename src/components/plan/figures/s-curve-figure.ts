import type { Detector, LoopDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { pointsOf, type Figure, type Point } from './figure';
import type { Series } from '../../plot/plot-model';

export type LoopKind = 'carrier' | 'clock';

const degrees = 180 / Math.PI;

/** Fig. 4: the mean error against the true one, without noise and at the operating point, with the slope at lock. */
export function sCurveFigure({ detector }: LoopDesign, kind: LoopKind, esN0Db: number): Figure {
  const scale = kind === 'carrier' ? degrees : 1;
  const half = (detector.period / 2) * scale;
  return {
    title: 'S-curve, detector units',
    file: 's-curve',
    x: {
      label: kind === 'carrier' ? 'phase error' : 'timing error',
      unit: kind === 'carrier' ? '°' : 'symbols',
      domain: [-half, half],
      ticks: [-half, -half / 2, 0, half / 2, half],
    },
    y: { label: 'error' },
    series: [...curves(detector, scale, esN0Db), slope(detector, scale)],
    markers: falseNulls(detector).map(({ x }) => ({
      x: x * scale,
      y: 0,
      tone: 'ink',
      hollow: true,
      label: 'false null',
    })),
    caption: captionOf(detector, kind, scale),
  };
}

/** Where the loop can settle although it is not in lock. */
const falseNulls = ({ nulls }: Detector) => nulls.filter(({ stable, lock }) => stable && !lock);

function curves({ curve, variance, gain, gainWithoutNoise }: Detector, scale: number, esN0Db: number): Series[] {
  const x = curve.x.map((at) => at * scale);
  const noisy = pointsOf(x, curve.noisy);
  const sigma = Math.sqrt(variance ?? 0);
  const area = noisy.map(([at, mean]): [number, number, number] => [at, mean - sigma, mean + sigma]);
  // Where noise leaves the mean alone, as in a product of two samples, one curve says all.
  const alike = gain === gainWithoutNoise;
  const noiseless: Series = {
    label: 'no noise',
    tone: 'soft',
    dash: true,
    thin: true,
    points: pointsOf(x, curve.noiseless),
  };
  const label = alike ? 'mean error' : `${numberText(esN0Db)} dB`;
  // Beside its trough the curve is alone: the slope and the curve without noise lie elsewhere.
  const labelAt = -(curve.x.at(-1) ?? 0) * scale * 0.62;
  const noisyCurve: Series = { label, tone: 'track', points: noisy, labelAt, ...(variance !== null && { area }) };
  return [...(alike ? [] : [noiseless]), noisyCurve];
}

/** The tangent at lock, over the middle of the period. */
function slope({ gain, period }: Detector, scale: number): Series {
  const reach = period / 6;
  const points: Point[] = [
    [-reach * scale, -reach * gain],
    [reach * scale, reach * gain],
  ];
  return { label: `slope ${numberText(gain, { decimals: 3 })}`, tone: 'ink', thin: true, points };
}

function captionOf(detector: Detector, kind: LoopKind, scale: number): string {
  const { gain, gainWithoutNoise, period, variance } = detector;
  const [before, after] = [gainWithoutNoise, gain].map((value) => numberText(value, { decimals: 3 }));
  const every =
    kind === 'carrier' ? `${numberText(period * scale, { significant: 4 })}°` : `${numberText(period)} symbol`;
  const change =
    before === after ? `The slope at lock is ${after}` : `Noise takes the slope from ${before} to ${after}`;
  const wrong = falseNulls(detector).map(
    ({ x }) => `${numberText(x * scale, { significant: 3 })}${kind === 'carrier' ? '°' : ' symbol'}`,
  );
  const trap = wrong.length ? ` The loop can also settle at ${wrong.join(' and ')}, out of lock.` : '';
  return `${change}; lock every ${every}.${trap}${variance === null ? '' : ' The band is ±1σ of one update.'}`;
}
