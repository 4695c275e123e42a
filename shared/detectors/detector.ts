/** One error detector on one modulation, worked out at the operating point for one evaluation per symbol. */
export interface DetectorModel {
  /** Slope Kd at lock with noise: detector units per radian (carrier) or per symbol (clock). */
  gain: number;
  /** The same slope without noise. */
  gainWithoutNoise: number;
  /** Period of the S-curve: radians (carrier) or symbols (clock). */
  period: number;
  /** Variance of the error at lock, detector units²; null where it is not worked out. */
  variance: number | null;
  /** Whether errors of different symbols are uncorrelated, so that their spectrum is flat. */
  memoryless: boolean;
  /** Mean error at a static offset x (radians or symbols), with and without noise. */
  noisy: (x: number) => number;
  noiseless: (x: number) => number;
}

export interface SCurveShape {
  /** Largest s(x) = S(x)/S′(0), radians or symbols. */
  largest: number;
  /** Mean square ⟨s²⟩ over a period. */
  meanSquare: number;
}

const curvePoints = 121;
const shapePoints = 256;

/** The S-curve over one period, centred on lock. */
export function sCurve(model: DetectorModel, scale: number) {
  const x = Array.from({ length: curvePoints }, (_, i) => model.period * (i / (curvePoints - 1) - 0.5));
  const along = (curve: (x: number) => number) => x.map((value) => scale * curve(value));
  return { x, noiseless: along(model.noiseless), noisy: along(model.noisy) };
}

/** Shape of the S-curve with noise, over its slope at lock. */
export function sCurveShape({ noisy, gain, period }: DetectorModel): SCurveShape {
  const s = Array.from({ length: shapePoints }, (_, i) => noisy(period * ((i + 0.5) / shapePoints - 0.5)) / gain);
  return { largest: Math.max(...s), meanSquare: s.reduce((sum, value) => sum + value ** 2, 0) / shapePoints };
}
