/**
 * The worked link by hand and by brute force, with nothing of the product: what the browser test compares with.
 *
 * QPSK, 27.5 MBd, 10 dB, unit amplitude, ζ = 1/√2, three updates of extra delay, 32-bit NCO stepped once a symbol,
 * 12-bit error word with full scale 2, 12-bit mantissas, 8 guard bits.
 */

/** Gains g1, g2 in exact fractions. ζ + 1/(4ζ) = 3/(2√2), so 2ζθ = 4·BnT/3 and θ² = 8·BnT²/9 (Rice 2009, appendix C). */
export const byHand = {
  acquire: { g1: 300 / 11401, g2: 4 / 11401 }, // BnT = 1/100: 2ζθ = 1/75, θ² = 1/11250
  track: { g1: 1500 / 141377, g2: 8 / 141377 }, // BnT = 1/250: 2ζθ = 2/375, θ² = 2/140625
} as const;

/** √2 erf √(γ/2) − 2 √(γ/π) e^(−γ/2) at γ = 10, with erf √5 = 0.998434597741997 (Abramowitz & Stegun 7.1, tables). */
export const detectorGain = Math.SQRT2 * 0.998434597741997 - 2 * Math.sqrt(10 / Math.PI) * Math.exp(-5);

/** Radians of phase for one LSB of a 32-bit frequency word. */
export const oscillatorGain = (2 * Math.PI) / 2 ** 32;

/** Detector units of one LSB of the 12-bit error word with full scale 2. */
const errorLsb = 2 ** (1 - 11);

/** The mantissa of b bits, 2^(b−2) ≤ M < 2^(b−1), and the right shift nearest to a wanted gain in output LSB per error LSB. */
export function nearestWord(gain: number, mantissaBits = 12): { mantissa: number; shift: number } {
  let shift = 0;
  while (Math.round(gain * 2 ** shift) < 2 ** (mantissaBits - 2)) shift += 1;
  while (Math.round(gain * 2 ** shift) >= 2 ** (mantissaBits - 1)) shift -= 1;
  return { mantissa: Math.round(gain * 2 ** shift), shift };
}

/** Wanted gain of each branch in output LSB per error LSB; the integrator has 8 guard bits below one NCO LSB. */
export const wantedGains = ({ g1, g2 }: { g1: number; g2: number }) => ({
  proportional: (g1 / (detectorGain * oscillatorGain)) * errorLsb,
  integral: (g2 / (detectorGain * oscillatorGain)) * errorLsb * 2 ** 8,
});

/** Loop gains g1, g2 that a pair of words really makes. */
export function gainsOfWords(p: { mantissa: number; shift: number }, i: { mantissa: number; shift: number }) {
  const scale = (detectorGain * oscillatorGain) / errorLsb;
  return { g1: p.mantissa * 2 ** -p.shift * scale, g2: (i.mantissa * 2 ** -i.shift * scale) / 2 ** 8 };
}

/** ½ Σ h[n]² by running the difference equation of the loop for an impulse, the new word acting `delay` updates late. */
export function noiseBandwidthBySum({ g1, g2 }: { g1: number; g2: number }, delay: number): number {
  const line: number[] = new Array<number>(delay).fill(0);
  let phase = 0;
  let integrator = 0;
  let sum = 0;
  for (let n = 0; n < 100_000; n += 1) {
    sum += phase * phase;
    const error = (n === 0 ? 1 : 0) - phase;
    integrator += g2 * error;
    line.push(g1 * error + integrator);
    phase += line.shift() ?? 0;
  }
  return sum / 2;
}
