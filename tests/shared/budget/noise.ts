/** Seeded normal noise of variance 1: xorshift of 32 bits, Box–Muller. */
export function gaussians(seed: number): () => number {
  let state = (seed * 2654435761) >>> 0 || 1;
  const uniform = (): number => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return ((state >>> 0) + 0.5) / 2 ** 32;
  };
  let spare: number | null = null;
  return () => {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    const [radius, angle] = [Math.sqrt(-2 * Math.log(uniform())), 2 * Math.PI * uniform()];
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}
