import type { DetectorModel } from './detector';
import type { Modulation } from './modulations';

/** The signal at a phase error detector. */
export interface CarrierSignal {
  modulation: Modulation;
  /** Amplitude A of the symbols at the detector, above 0. */
  amplitude: number;
  /** Es/N0 γ as a ratio, above 0; noise of variance A²/(2γ) on each rail. */
  esN0: number;
  /** Roll-off α of the raised-cosine pulse, 0 to 1; OQPSK alone depends on it. */
  rollOff: number;
  /** Radii of the outer rings of APSK over the inner one; the usual ones where there are none. */
  ringRatios?: readonly number[] | undefined;
}

export type MakeCarrierModel = (signal: CarrierSignal) => DetectorModel;

/** The same detector with every value `factor` times as large. */
export function scaledModel(model: DetectorModel, factor: number): DetectorModel {
  const squared = (values: readonly number[]) => values.map((value) => value * factor ** 2);
  return {
    ...model,
    gain: factor * model.gain,
    gainWithoutNoise: factor * model.gainWithoutNoise,
    covariance: model.covariance && squared(model.covariance),
    selfCovariance: squared(model.selfCovariance),
    noisy: (x) => factor * model.noisy(x),
    noiseless: (x) => factor * model.noiseless(x),
  };
}
