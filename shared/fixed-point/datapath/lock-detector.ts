import type { Words } from '../../model/words';
import { raise, type ExactSample } from './phase-detector';

/** Numerator and denominator of the lock statistic of a whole block. */
export interface LockBlock {
  num: bigint;
  den: bigint;
}

/** True when a block is in lock at threshold T in 1/256: den > 0 and num ≥ ⌊T·den/2^8⌋. */
export const inLock = ({ num, den }: LockBlock, threshold: number): boolean =>
  den > 0n && num >= (BigInt(threshold) * den) >> 8n;

/** Adds one sample to the block; returns the sums where the block ends. */
export function lockDetector(words: Words): (z: ExactSample) => LockBlock | undefined {
  const { averagingSymbols, power, sign } = words.lock;
  const shift = BigInt(Math.max(0, words.sampleBits - 7));
  let block = { num: 0n, den: 0n };
  let count = 0;
  return ([i, q]) => {
    const u = [i >> shift, q >> shift] as const;
    block.num += BigInt(sign) * raise(u, power)[0];
    block.den += (u[0] * u[0] + u[1] * u[1]) ** BigInt(power / 2);
    count += 1;
    if (count < averagingSymbols) return undefined;
    const done = block;
    block = { num: 0n, den: 0n };
    count = 0;
    return done;
  };
}
