export interface QuadratureRule {
  /** Rising, between −1 and 1. */
  nodes: Float64Array;
  /** One for each node; their sum is 2. */
  weights: Float64Array;
}

/** Gauss–Legendre rule on [−1, 1]: exact for polynomials up to degree 2·count − 1. Nodes by Newton's iteration. */
export function gaussLegendre(count: number): QuadratureRule {
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    let x = -Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let { value, slope } = legendre(count, x);
    for (let round = 0; round < 5; round += 1) {
      x -= value / slope;
      ({ value, slope } = legendre(count, x));
    }
    nodes[i] = x;
    weights[i] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

/** Legendre polynomial of a degree and its derivative, by the three-term recurrence. */
function legendre(degree: number, x: number): { value: number; slope: number } {
  let [before, value] = [1, x];
  for (let n = 2; n <= degree; n += 1) {
    [before, value] = [value, ((2 * n - 1) * x * value - (n - 1) * before) / n];
  }
  return { value, slope: (degree * (x * value - before)) / (x * x - 1) };
}
