import { nullsOf } from './nulls';

/** One error detector on one modulation, worked out at the operating point for one evaluation per symbol. */
export interface DetectorModel {
  /** Slope Kd at lock with noise: detector units per radian (carrier) or per symbol (clock). */
  gain: number;
  /** The same slope without noise. */
  gainWithoutNoise: number;
  /** Period of the S-curve: radians (carrier) or symbols (clock). */
  period: number;
  /**
   * Autocovariance of the errors at lock over lags of 0, 1, 2 … evaluations (one a symbol), detector units²: channel
   * noise and pattern together. The first is the variance; one entry alone says that errors are uncorrelated. Null
   * where it is not worked out.
   */
  covariance: readonly number[] | null;
  /** The part of it that is left without channel noise, at as many lags or fewer; empty where there is none. */
  selfCovariance: readonly number[];
  /** The slope goes with the amplitude to this power. */
  amplitudeExponent: number;
  /** Mean error at a static offset x (radians or symbols), with and without noise; both odd functions. */
  noisy: (x: number) => number;
  noiseless: (x: number) => number;
}

/** Whether errors of different evaluations are uncorrelated, so that their spectrum is flat. */
export const isMemoryless = ({ covariance }: DetectorModel): boolean => covariance?.length === 1;

/** Variance of one error at lock, detector units²; null where it is not worked out. */
export const varianceOf = ({ covariance }: DetectorModel): number | null => covariance?.[0] ?? null;

/** Spectral density of the error of one evaluation per symbol at frequency 0: the sum over all lags, both signs. */
export const spectrumAtZero = ({ covariance }: DetectorModel): number | null =>
  covariance && covariance.slice(1).reduce((sum, value) => sum + 2 * value, covariance[0] ?? 0);

/** The same function of a model, worked out once for each. */
function once<T>(of: (model: DetectorModel) => T): (model: DetectorModel) => T {
  const done = new WeakMap<DetectorModel, T>();
  return (model) => {
    const value = done.get(model) ?? of(model);
    done.set(model, value);
    return value;
  };
}

const nulls = once(nullsOf);

/**
 * What is known of the error at lock.
 *
 * @param counted evaluations that one update adds up
 */
export function errorStatistics(model: DetectorModel, counted: number) {
  const [variance, spectrum] = [varianceOf(model), spectrumAtZero(model)];
  return {
    variance: variance === null ? null : counted * variance,
    memoryless: isMemoryless(model),
    spectrumAtZero: spectrum === null ? null : counted * spectrum,
    selfNoise: variance === null ? null : counted * (model.selfCovariance[0] ?? 0),
    amplitudeExponent: model.amplitudeExponent,
    nulls: nulls(model),
  };
}

export interface SCurveShape {
  /** Largest s(x) = S(x)/S′(0), radians or symbols. */
  largest: number;
  /** Mean square ⟨s²⟩ over a period. */
  meanSquare: number;
  /** ½b_n² of the series Σ b_n·sin(2πnx/period), n = 1, 2 …; their sum is ⟨s²⟩. */
  powers: number[];
}

const curvePoints = 121;
const shapePoints = 256;
const harmonics = 11;
/** sin(2πn·x) at the places of a shape, n = 1, 2 … */
const sines = Array.from({ length: harmonics }, (_, n) =>
  Float64Array.from({ length: shapePoints }, (_each, i) =>
    Math.sin(2 * Math.PI * (n + 1) * ((i + 0.5) / shapePoints - 0.5)),
  ),
);

/** The S-curve over one period, centred on lock. */
export function sCurve(model: DetectorModel, scale: number) {
  const { x, noiseless, noisy } = unitCurve(model);
  return { x, noiseless: noiseless.map((value) => scale * value), noisy: noisy.map((value) => scale * value) };
}

const unitCurve = once(({ period, noiseless, noisy }) => {
  const x = Array.from({ length: curvePoints }, (_, i) => period * (i / (curvePoints - 1) - 0.5));
  return { x, noiseless: oddValues(noiseless, x), noisy: oddValues(noisy, x) };
});

/** Values of an odd function at places that are each other's mirror images about 0, the latter half worked out. */
function oddValues(curve: (x: number) => number, places: readonly number[]): number[] {
  const right = places.slice(Math.ceil(places.length / 2)).map(curve);
  const middle = places.length % 2 === 1 ? [0] : [];
  return [...right.map((value) => -value).reverse(), ...middle, ...right];
}

/** Shape of the S-curve with noise, over its slope at lock. */
export const sCurveShape = once(({ noisy, gain, period }: DetectorModel): SCurveShape => {
  const places = Array.from({ length: shapePoints }, (_, i) => period * ((i + 0.5) / shapePoints - 0.5));
  const s = oddValues(noisy, places).map((value) => value / gain);
  const mean = (of: (value: number, i: number) => number) =>
    s.reduce((sum, value, i) => sum + of(value, i), 0) / shapePoints;
  const meanSquare = mean((value) => value ** 2);
  const powers = sines.map((sine) => (2 * mean((value, i) => value * sine[i]!)) ** 2 / 2);
  // The rest of the series counts as one more harmonic.
  const rest = Math.max(0, meanSquare - powers.reduce((sum, power) => sum + power, 0));
  return { largest: Math.max(...s), meanSquare, powers: [...powers, rest] };
});
