import { ParameterError } from '../parameter-error';

/** A complex number as [in-phase, quadrature]. */
export type Point = readonly [number, number];

/** The modulations whose points the datapath decides on. */
export type PointModulation = 'bpsk' | 'qpsk' | '8psk' | '16qam' | '64qam' | '16apsk' | '32apsk';

/**
 * Points of a modulation with E|a|² = 1, in the order that breaks a tie between equally near points: phase
 * states counter-clockwise from the positive real axis (QPSK from 45°), square QAM row by row from the most
 * negative rails, in-phase first, APSK ring by ring from the inner one, each counter-clockwise.
 *
 * @param ringRatios radii of the outer rings over the inner one, for APSK
 * @throws {ParameterError} naming `modulation` when there is no such list, `ringRatios` when APSK lacks them
 */
export function constellation(modulation: string, ringRatios: readonly number[] = []): Point[] {
  const points = makers[modulation as PointModulation]?.(ringRatios);
  if (!points) throw new ParameterError('modulation', `no point list for ${modulation}`);
  return points;
}

const makers: Record<PointModulation, (ringRatios: readonly number[]) => Point[]> = {
  bpsk: () => [
    [1, 0],
    [-1, 0],
  ],
  qpsk: () => phaseStates(4, Math.PI / 4),
  '8psk': () => phaseStates(8, 0),
  '16qam': () => squareGrid(4),
  '64qam': () => squareGrid(8),
  '16apsk': (ratios) => rings([4, 12], [Math.PI / 4, Math.PI / 12], ratios),
  '32apsk': (ratios) => rings([4, 12, 16], [Math.PI / 4, Math.PI / 12, 0], ratios),
};

function rings(counts: readonly number[], firsts: readonly number[], ratios: readonly number[]): Point[] {
  if (ratios.length !== counts.length - 1) throw new ParameterError('ringRatios', 'one ratio for each outer ring');
  const radii = [1, ...ratios];
  const points = counts.flatMap((count, ring) => scaled(phaseStates(count, firsts[ring]!), radii[ring]!));
  const power = points.reduce((sum, [i, q]) => sum + i * i + q * q, 0) / points.length;
  return scaled(points, 1 / Math.sqrt(power));
}

const scaled = (points: readonly Point[], scale: number): Point[] => points.map(([i, q]) => [i * scale, q * scale]);

function phaseStates(count: number, first: number): Point[] {
  return Array.from({ length: count }, (_, k) => {
    const angle = first + (2 * Math.PI * k) / count;
    return [Math.cos(angle), Math.sin(angle)] as const;
  });
}

function squareGrid(side: number): Point[] {
  const spacing = 1 / Math.sqrt((2 * (side ** 2 - 1)) / 3);
  const rails = Array.from({ length: side }, (_, k) => (2 * k - side + 1) * spacing);
  return rails.flatMap((i) => rails.map((q) => [i, q] as const));
}
