/** ∫ f·φ over the normal density φ of a standard deviation, by 4001 points of Simpson's rule over ±10 deviations. */
export function overNoise(deviation: number, value: (noise: number) => number): number {
  const [steps, reach] = [4000, 10];
  let sum = 0;
  for (let i = 0; i <= steps; i += 1) {
    const x = reach * ((2 * i) / steps - 1);
    const weight = i === 0 || i === steps ? 1 : i % 2 ? 4 : 2;
    sum += weight * value(x * deviation) * Math.exp((-x * x) / 2);
  }
  return (sum * (2 * reach)) / steps / 3 / Math.sqrt(2 * Math.PI);
}
