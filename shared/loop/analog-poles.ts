import { publishedForm } from './third-order-form';
import type { ThirdOrderForm } from './third-order-form';

/** Poles of the analog loop in rad/s: −K, ωn·(−ζ ± j√(1 − ζ²)), or the roots of the order-3 form times ω0. */
export function analogPoles({
  order,
  damping,
  omega,
  form = publishedForm,
}: {
  order: number;
  damping: number;
  omega: number;
  /** Order 3 only. */
  form?: ThirdOrderForm;
}): [number, number][] {
  const unit = order === 1 ? [-1] : order === 2 ? quadraticRoots(2 * damping, 1) : thirdOrderRoots(form);
  return unit.map((root): [number, number] =>
    typeof root === 'number' ? [omega * root, 0] : [omega * root[0], omega * root[1]],
  );
}

/** Roots of s² + b·s + c. */
function quadraticRoots(b: number, c: number): [number, number][] {
  const discriminant = b ** 2 / 4 - c;
  if (discriminant < 0)
    return [
      [-b / 2, Math.sqrt(-discriminant)],
      [-b / 2, -Math.sqrt(-discriminant)],
    ];
  const far = -b / 2 - Math.sqrt(discriminant);
  return [
    [c / far, 0],
    [far, 0],
  ];
}

/** The real root by Newton's method from below every root, then the quadratic that is left. */
function thirdOrderRoots({ a3, b3 }: ThirdOrderForm): [number, number][] {
  let real = -(1 + Math.max(1, a3, b3));
  for (let round = 0; round < 50; round += 1) {
    real -= (((real + b3) * real + a3) * real + 1) / ((3 * real + 2 * b3) * real + a3);
  }
  return [...quadraticRoots(b3 + real, -1 / real), [real, 0]];
}
