import type { CarrierWords } from '../../model/words';
import type { CarrierTables } from '../tables';
import { carrierDatapath } from './carrier-exact';
import { carrierInDoubles } from './carrier-doubles';
import { fitsDoubles } from './fits-doubles';

/** Nodes of a run of symbols, one element a symbol; those named `low` hold the low 32 bits of a wider node. */
export interface CarrierNodes {
  zI: Int32Array;
  zQ: Int32Array;
  /** Of the newest update, as are acc, acc2 and w. */
  e: Int32Array;
  accLow: Int32Array;
  acc2Low: Int32Array;
  wLow: Int32Array;
  phaseLow: Int32Array;
  /** Integrator as the nearest double, in its own LSB. */
  acc: Float64Array;
  /** NCO steps of the symbol, each times the loop word w then in use, as the nearest double: NCO LSB. */
  advance: Float64Array;
  stage: Uint8Array;
}

/** The carrier datapath over runs of symbols; the state goes on from one run to the next. */
export interface CarrierRunner {
  /** @param known index of each symbol sent, for `known-symbols` · @param count symbols to run, at most the arrays' length */
  run(xI: Int32Array, xQ: Int32Array, known: Uint8Array, count: number, out: CarrierNodes): void;
}

export function carrierNodes(length: number): CarrierNodes {
  const ints = () => new Int32Array(length);
  return {
    zI: ints(),
    zQ: ints(),
    e: ints(),
    accLow: ints(),
    acc2Low: ints(),
    wLow: ints(),
    phaseLow: ints(),
    acc: new Float64Array(length),
    advance: new Float64Array(length),
    stage: new Uint8Array(length),
  };
}

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
