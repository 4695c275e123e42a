import type { CarrierWords } from '../../model/words';
import { toNumber } from '../format';
import { wholeCircle } from '../rotator-table';
import type { CarrierTables } from '../tables';
import type { CarrierRunner } from './carrier-block';
import { doubleShift, doubleWord, fitDouble, shiftDouble } from './double-arithmetic';
import { filterInDoubles } from './filter-doubles';
import { lockInDoubles } from './lock-doubles';
import { detectorLsbLog2 } from './phase-detector';
import { detectorInDoubles } from './phase-detector-doubles';

/**
 * The carrier datapath in doubles: the same nodes to the bit as the exact one for words that `fitsDoubles` proves,
 * and many times as fast. One loop over the symbols, its state in local variables, is what makes it so.
 */
export function carrierInDoubles(words: CarrierWords, tables: CarrierTables): CarrierRunner {
  const { nco, rounding, overflow, errorBits, symbolsPerUpdate, updatesPerSymbol, stages } = words;
  const { cosine, sine } = wholeCircle(tables);
  const rotatorShift = doubleShift(words.tableBits - 2, rounding);
  const sampleWord = doubleWord(words.sampleBits, overflow.sample);
  const errorShift = doubleShift(words.errorFullScaleLog2 - (errorBits - 1) - detectorLsbLog2(words), rounding);
  const errorWord = doubleWord(errorBits, overflow.error);
  const detect = detectorInDoubles(words, tables.decision);
  const filter = filterInDoubles(words, nco.widthBits);
  const lock = lockInDoubles(words);
  const span = 2 ** nco.widthBits;
  const perSpan = 2 ** -nco.widthBits;
  const address = 2 ** (nco.phaseBits - nco.widthBits);
  const steps = nco.stepsPerSymbol / updatesPerSymbol;
  const fcw = toNumber(nco.fcw);

  let phase = 0;
  let word = 0;
  let w = 0;
  let e = 0;
  let sum = 0;
  let counted = 0;
  let stage = 0;
  let symbols = 0;

  const nextStage = (updated: boolean): void => {
    symbols += 1;
    const { untilSymbols, lockThreshold } = stages[stage]!;
    const ran = updated && untilSymbols !== null && symbols >= untilSymbols;
    if (!ran && !(lockThreshold !== null && lock.blockInLock(lockThreshold))) return;
    stage += 1;
    symbols = 0;
    filter.load(stage);
  };

  return {
    run(xI, xQ, known, count, out) {
      const { zI, zQ } = out;
      for (let k = 0; k < count; k++) {
        const index = Math.floor(phase * address);
        const c = cosine[index]!;
        const s = sine[index]!;
        const i = fitDouble(shiftDouble(xI[k]! * c + xQ[k]! * s, rotatorShift), sampleWord);
        const q = fitDouble(shiftDouble(xQ[k]! * c - xI[k]! * s, rotatorShift), sampleWord);
        zI[k] = i;
        zQ[k] = q;
        sum += detect(i, q, known[k]!);
        counted += 1;
        if (lock.used) lock.add(i, q);
        const updated = counted === symbolsPerUpdate;
        let advance = 0;
        if (updated) {
          e = fitDouble(shiftDouble(sum, errorShift), errorWord);
          sum = 0;
          counted = 0;
          for (let m = 0; m < updatesPerSymbol; m++) {
            w = filter.update(e);
            word = fcw + w;
            word -= Math.floor(word * perSpan) * span;
            advance += w * steps;
            phase += word * steps;
            phase -= Math.floor(phase * perSpan) * span;
          }
        } else {
          advance = w * nco.stepsPerSymbol;
          phase += word * nco.stepsPerSymbol;
          phase -= Math.floor(phase * perSpan) * span;
        }
        if (stage + 1 < stages.length) nextStage(updated);
        out.e[k] = e;
        out.accLow[k] = out.acc[k] = filter.acc;
        out.acc2Low[k] = filter.acc2;
        out.wLow[k] = w;
        out.phaseLow[k] = phase;
        out.advance[k] = advance;
        out.stage[k] = stage;
      }
    },
  };
}
