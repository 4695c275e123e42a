/** A numerator B, and the numerator C that a coloured noise makes of it; of one length with the denominator. */
export interface Numerators {
  plain: Float64Array;
  weighted: Float64Array | null;
}

/**
 * The integrals of B(z)·C(1/z)/(A(z)·A(1/z)) round the circle, C = B where there is no other, by the recursion that takes
 * A down degree by degree (see `noiseBandwidth`), in doubles. What it is given is used up.
 *
 * @param a denominator, highest power first, as long as the numerators
 * @returns one value for each numerator; null when a pole is not inside the circle
 */
export function swiftEnergies(a: Float64Array, numerators: readonly Numerators[]): number[] | null {
  const lead = a[0] as number;
  const reversed = new Float64Array(a.length);
  const energies = numerators.map(() => 0);
  for (let k = a.length - 1; k >= 0; k -= 1) {
    const top = a[0] as number;
    if (!(top > 0)) return null;
    for (let i = 0; i <= k; i += 1) reversed[i] = a[k - i] as number;
    numerators.forEach(({ plain, weighted }, n) => {
      const own = plain[k] as number;
      const other = weighted ? (weighted[k] as number) : own;
      energies[n] = (energies[n] as number) + (own * other) / (top * lead);
      subtract(plain, own / top, reversed, k);
      if (weighted) subtract(weighted, other / top, reversed, k);
    });
    subtract(a, (a[k] as number) / top, reversed, k);
  }
  return energies.every(Number.isFinite) ? energies : null;
}

function subtract(target: Float64Array, factor: number, source: Float64Array, count: number): void {
  for (let i = 0; i < count; i += 1) target[i] = (target[i] as number) - factor * (source[i] as number);
}
