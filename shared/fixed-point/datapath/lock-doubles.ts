import type { CarrierWords } from '../../model/words';

/** The lock detector in doubles; it runs only where a stage waits for it. */
export interface LockDoubles {
  readonly used: boolean;
  add(zI: number, zQ: number): void;
  /** True when the newest symbol ended a block that is in lock at T/256. */
  blockInLock(threshold: number): boolean;
}

export function lockInDoubles({ lock, sampleBits, stages }: CarrierWords): LockDoubles {
  const { averagingSymbols, power, sign } = lock;
  const cut = Math.max(0, sampleBits - 7);
  let num = 0;
  let den = 0;
  let count = 0;

  return {
    used: stages.slice(0, -1).some(({ lockThreshold }) => lockThreshold !== null),
    add(zI, zQ) {
      if (count === averagingSymbols) num = den = count = 0;
      let re = zI >> cut;
      let im = zQ >> cut;
      let size = re * re + im * im;
      for (let done = 1; done < power; done *= 2) {
        const square = re * re - im * im;
        im = 2 * re * im;
        re = square;
        if (done > 1) size *= size;
      }
      num += sign * re;
      den += size;
      count += 1;
    },
    blockInLock: (threshold) => count === averagingSymbols && den > 0 && num >= Math.floor((threshold * den) / 256),
  };
}
