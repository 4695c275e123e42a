/** Which trial a stream belongs to; each triple has a stream of its own, whoever draws it and in whatever order. */
export interface TrialKey {
  /** Seed of the check, 0 to 2^32 − 1. */
  seed: number;
  point: number;
  trial: number;
}

/**
 * Stream of 32-bit words by xoshiro128++, its state mixed from the trial's key. For one seed and point every trial
 * starts from another state.
 *
 * @see D. Blackman, S. Vigna, "Scrambled linear pseudorandom number generators", ACM TOMS 47 (2021)
 */
export class TrialRandom {
  private a: number;
  private b: number;
  private c: number;
  private d: number;

  constructor(key: TrialKey) {
    [this.a, this.b, this.c, this.d] = [0x9e3779b9, 0x7f4a7c15, 0xf39cc060, 0x5cedc834].map((lane) =>
      mix(mix(mix(lane ^ key.seed) + key.point) + key.trial),
    ) as [number, number, number, number];
    for (let k = 0; k < 8; k++) this.word();
  }

  /** Next word, 0 to 2^32 − 1. */
  word(): number {
    const { a, b, d } = this;
    const raised = (a + d) | 0;
    const result = (((raised << 7) | (raised >>> 25)) + a) >>> 0;
    const shifted = b << 9;
    this.c ^= a;
    this.d ^= b;
    this.b ^= this.c;
    this.a ^= this.d;
    this.c ^= shifted;
    this.d = (this.d << 11) | (this.d >>> 21);
    return result;
  }

  /** Next number in [0, 1), a multiple of 2^−32. */
  fraction(): number {
    return this.word() * 2 ** -32;
  }
}

/** A bijection of 32-bit words in which every bit depends on every other (the finaliser of MurmurHash3). */
function mix(value: number): number {
  let h = value | 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}
