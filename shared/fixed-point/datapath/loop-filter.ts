import type { Words } from '../../model/words';
import { fit, toBigInt } from '../format';
import { roundShift } from '../rounding';

/** Nodes of the loop filter after one update. */
export interface FilterNodes {
  acc: bigint;
  acc2: bigint;
  w: bigint;
}

/** The loop filter of either loop, exact: `update` takes the error word and the index of the stage in use. */
export interface LoopFilter {
  update(error: bigint, stage: number): FilterNodes;
}

/**
 * @param words words of a carrier or clock loop
 * @param outputBits width of the word that the loop drives: NCO or counter
 */
export function loopFilter(words: Words, outputBits: number): LoopFilter {
  const { order, rounding, overflow, integratorBits, integrator2Bits, delay } = words;
  const guard = BigInt(words.guardBits);
  const guard2 = BigInt(words.guard2Bits);
  const limit = words.integratorLimit === null ? undefined : toBigInt(words.integratorLimit);
  const line = Array.from({ length: delay }, () => 0n);
  const scaled = (d: bigint, { mantissa, shift }: { mantissa: number; shift: number }) =>
    roundShift(d * BigInt(mantissa), shift, rounding);
  let acc = 0n;
  let acc2 = 0n;

  const integrate = (d: bigint, stage: number): void => {
    const { integral, integral2 } = words.stages[stage]!;
    if (order === 3) {
      acc2 = fit(
        acc2 + fit(scaled(d, integral2), integrator2Bits, overflow.increment2),
        integrator2Bits,
        overflow.integrator2,
      );
    }
    let increment = fit(scaled(d, integral), integratorBits, overflow.increment);
    if (order === 3) increment = fit(increment + (acc2 >> guard2), integratorBits, overflow.increment);
    acc =
      limit === undefined ? fit(acc + increment, integratorBits, overflow.integrator) : clamp(acc + increment, limit);
  };

  return {
    update(error, stage) {
      line.push(error);
      const d = line.shift()!;
      if (order > 1) integrate(d, stage);
      const p = fit(scaled(d, words.stages[stage]!.proportional), outputBits, overflow.proportional);
      return { acc, acc2, w: p + (acc >> guard) };
    },
  };
}

function clamp(value: bigint, limit: bigint): bigint {
  if (value > limit) return limit;
  return value < -limit ? -limit : value;
}
