import type { Environment } from './complete';

/** The part of a plan that says how far the carrier may be off. */
export interface CarrierEnvironment {
  /** Hz; absent where the tolerance is not given in ppm of a carrier. */
  carrierFrequencyHz?: number;
  /** Tolerance of each end, ± ppm of the carrier, 0 or more. */
  carrierTolerancePpm?: number;
  /** Largest Doppler shift, ± Hz, 0 or more. */
  dopplerHz?: number;
}

/**
 * Largest carrier offset that a plan asks its carrier loop to lock to, ± Hz: transmitter and receiver may both be
 * off by the tolerance, in opposite directions, and Doppler comes on top.
 *
 *     2 · tolerance · 10^−6 · carrier + Doppler
 *
 * @returns Hz, 0 or more; 0 when the plan gives neither a tolerance of a carrier nor a Doppler shift
 * @example requiredOffsetHz({ carrierFrequencyHz: 1.55e9, carrierTolerancePpm: 25 }) // => 77500
 */
export function requiredOffsetHz(environment: CarrierEnvironment): number {
  const { carrierFrequencyHz = 0, carrierTolerancePpm = 0, dopplerHz = 0 } = environment;
  return (2 * carrierTolerancePpm * carrierFrequencyHz) / 1e6 + dopplerHz;
}

/** The same of a completed plan; null when a tolerance is given in ppm of a carrier that is not. */
export function askedOffsetHz({ carrierFrequencyHz, ...environment }: Environment): number | null {
  if (carrierFrequencyHz === undefined) return environment.carrierTolerancePpm === 0 ? environment.dopplerHz : null;
  return requiredOffsetHz({ carrierFrequencyHz, ...environment });
}

/** Largest clock error that both ends make together, ± ppm. */
export const askedErrorPpm = ({ clockTolerancePpm }: Pick<Environment, 'clockTolerancePpm'>): number =>
  2 * clockTolerancePpm;
