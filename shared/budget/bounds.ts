/** ∫ f²|P(f)|² df of a root-raised-cosine pulse of unit energy, symbol period 1: 1/12 + α²(1/4 − 2/π²). */
export const meanSquareBandwidth = (rollOff: number): number => 1 / 12 + rollOff ** 2 * (1 / 4 - 2 / Math.PI ** 2);

/**
 * Modified Cramér–Rao bounds of tracking over L = 1/(2·BnT) symbols: the phase BnT/γ rad², the timing
 * 1/(8π²ξLγ) = BnT/(4π²ξγ) symbols², ξ the mean square bandwidth of the pulse.
 *
 * @param noiseBandwidth BnT per symbol
 * @param esN0 γ as a ratio
 * @see A. D'Andrea, U. Mengali, R. Reggiannini, "The modified Cramer-Rao bound and its application to synchronization
 *   problems", 1994
 */
export const phaseBound = (noiseBandwidth: number, esN0: number): number => noiseBandwidth / esN0;

export const timingBound = (noiseBandwidth: number, esN0: number, rollOff: number): number =>
  noiseBandwidth / (4 * Math.PI ** 2 * meanSquareBandwidth(rollOff) * esN0);
