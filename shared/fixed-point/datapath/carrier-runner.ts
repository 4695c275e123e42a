import type { CarrierWords } from '../../model/words';
import type { CarrierTables } from '../tables';
import { carrierDatapath } from './carrier-exact';
import { carrierInDoubles } from './carrier-doubles';
import { fitsDoubles } from './fits-doubles';
import type { CarrierRunner } from './carrier-nodes';

/** The fastest form that is exact for these words: doubles where every node provably fits them, else unbounded integers. */
export const carrierRunner = (words: CarrierWords, tables: CarrierTables): CarrierRunner =>
  fitsDoubles(words, tables).fits ? carrierInDoubles(words, tables) : carrierInIntegers(words, tables);

/** The exact datapath behind the interface of runs. */
export function carrierInIntegers(words: CarrierWords, tables: CarrierTables): CarrierRunner {
  const datapath = carrierDatapath(words, tables);
  const low = (value: bigint): number => Number(BigInt.asIntN(32, value));
  const steps = words.nco.stepsPerSymbol;
  let last = { e: 0n, acc: 0n, acc2: 0n, w: 0n, word: 0n };
  return {
    run(xI, xQ, known, count, out) {
      for (let k = 0; k < count; k++) {
        const step = datapath.step({ x: [xI[k]!, xQ[k]!], known: known[k]! });
        const updates = step.updates.length > 0 ? step.updates : [last];
        last = updates.at(-1)!;
        out.zI[k] = Number(step.z[0]);
        out.zQ[k] = Number(step.z[1]);
        out.e[k] = Number(last.e);
        out.accLow[k] = low(last.acc);
        out.acc2Low[k] = low(last.acc2);
        out.wLow[k] = low(last.w);
        out.phaseLow[k] = low(step.phase);
        out.acc[k] = Number(last.acc);
        out.advance[k] = updates.reduce((sum, { w }) => sum + Number(w), 0) * (steps / updates.length);
        out.stage[k] = step.stage;
      }
    },
  };
}
