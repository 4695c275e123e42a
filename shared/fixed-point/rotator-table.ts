/** First octant of the rotator's cosine and sine, index i for the angle 2πi/2^P, i = 0 … 2^(P−3). */
export interface RotatorTable {
  cosine: number[];
  sine: number[];
}

export interface RotatorTableShape {
  /** Phase bits P that address the table, 3 to 16. */
  phaseBits: number;
  /** Width Wt of an entry, 4 to 24: unity is 2^(Wt − 2). */
  tableBits: number;
}

/**
 * Cosine and sine times 2^(Wt−2) to the nearest integer over the first octant. No entry lies at a half, so any
 * accurate cosine gives the same integers.
 *
 * @example rotatorTable({ phaseBits: 3, tableBits: 4 }) // => { cosine: [4, 3], sine: [0, 3] }
 */
export function rotatorTable({ phaseBits, tableBits }: RotatorTableShape): RotatorTable {
  const unity = 2 ** (tableBits - 2);
  const angles = Array.from({ length: 2 ** (phaseBits - 3) + 1 }, (_, i) => (2 * Math.PI * i) / 2 ** phaseBits);
  return {
    cosine: angles.map((angle) => Math.round(unity * Math.cos(angle))),
    sine: angles.map((angle) => Math.round(unity * Math.sin(angle))),
  };
}

/** The whole circle of 2^P entries, from the first octant by symmetry. */
export function wholeCircle({ cosine, sine }: RotatorTable): { cosine: Int32Array; sine: Int32Array } {
  const octant = cosine.length - 1;
  const circle = { cosine: new Int32Array(8 * octant), sine: new Int32Array(8 * octant) };
  for (let i = 0; i < 2 * octant; i++) {
    const c = i <= octant ? cosine[i]! : sine[2 * octant - i]!;
    const s = i <= octant ? sine[i]! : cosine[2 * octant - i]!;
    [
      [c, s],
      [-s, c],
      [-c, -s],
      [s, -c],
    ].forEach(([cos, sin], quadrant) => {
      circle.cosine[i + 2 * octant * quadrant] = cos!;
      circle.sine[i + 2 * octant * quadrant] = sin!;
    });
  }
  return circle;
}
