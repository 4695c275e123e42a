/** Seeded uniform numbers in (0, 1) and normal ones of deviation 1: mulberry32 and the Box–Muller transform. */
export class Noise {
  constructor(private state: number) {}

  uniform(): number {
    this.state = (this.state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(this.state ^ (this.state >>> 15), 1 | this.state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return (((mixed ^ (mixed >>> 14)) >>> 0) + 0.5) / 2 ** 32;
  }

  normal(): number {
    return Math.sqrt(-2 * Math.log(this.uniform())) * Math.cos(2 * Math.PI * this.uniform());
  }

  index(count: number): number {
    return Math.floor(count * this.uniform());
  }
}
