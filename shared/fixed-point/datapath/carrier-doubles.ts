import type { CarrierWords } from '../../model/words';
import { toNumber } from '../format';
import { wholeCircle } from '../rotator-table';
import type { CarrierTables } from '../tables';
import type { CarrierRunner } from './carrier-nodes';
import { beyond, evenUnit, roundingHalf, toEven } from './double-arithmetic';
import { gainInDoubles } from './gain-doubles';
import { lockInDoubles } from './lock-doubles';
import { detectorLsbLog2 } from './phase-detector';
import { detectorInDoubles } from './phase-detector-doubles';

/**
 * The carrier datapath in doubles: the same nodes to the bit as the exact one for words that `fitsDoubles` proves,
 * and many times as fast. `run` is one long loop on purpose: constants and state have to be local variables while it
 * turns, or each symbol pays for reading and writing objects.
 */
export function carrierInDoubles(words: CarrierWords, tables: CarrierTables): CarrierRunner {
  const { nco, order, rounding, overflow, stages, integratorLimit } = words;
  const circle = wholeCircle(tables);
  const errorRight = words.errorFullScaleLog2 - (words.errorBits - 1) - detectorLsbLog2(words);
  const detector = detectorInDoubles(words, tables.decision);
  const plainQpsk = words.detector === 'sign' && words.modulation === 'qpsk';
  const lock = lockInDoubles(words);
  const line = new Float64Array(words.delay + 1);
  const state = { phase: 0, word: 0, w: 0, e: 0, sum: 0, acc: 0, acc2: 0, counted: 0, stage: 0, symbols: 0, place: 0 };

  /** True when the symbol that ends now loads the next stage. */
  const stageEnds = (stage: number, symbols: number, updated: boolean): boolean => {
    const { untilSymbols, lockThreshold } = stages[stage]!;
    const ran = updated && untilSymbols !== null && symbols >= untilSymbols;
    return ran || (lockThreshold !== null && lock.blockInLock(lockThreshold));
  };

  return {
    run(xI, xQ, known, count, out) {
      const { cosine, sine } = circle;
      const { zI, zQ, advance, stage: stageOut } = out;
      const rotatorScale = 2 ** -(words.tableBits - 2);
      const rotatorHalf = roundingHalf(words.tableBits - 2, rounding);
      const rotatorEven = evenUnit(words.tableBits - 2, rounding);
      const sampleTop = 2 ** (words.sampleBits - 1);
      const sampleWraps = overflow.sample === 'wrap';
      const errorScale = 2 ** -errorRight;
      const errorHalf = roundingHalf(errorRight, rounding);
      const errorEven = evenUnit(errorRight, rounding);
      const errorTop = 2 ** (words.errorBits - 1);
      const errorWraps = overflow.error === 'wrap';
      const outputTop = 2 ** (nco.widthBits - 1);
      const outputWraps = overflow.proportional === 'wrap';
      const top = 2 ** (words.integratorBits - 1);
      const incrementWraps = overflow.increment === 'wrap';
      const integratorWraps = overflow.integrator === 'wrap';
      const top2 = 2 ** (words.integrator2Bits - 1);
      const increment2Wraps = overflow.increment2 === 'wrap';
      const integrator2Wraps = overflow.integrator2 === 'wrap';
      const limit = integratorLimit === null ? -1 : toNumber(integratorLimit);
      const perGuard = 2 ** -words.guardBits;
      const perGuard2 = 2 ** -words.guard2Bits;
      const span = 2 ** nco.widthBits;
      const perSpan = 2 ** -nco.widthBits;
      const address = 2 ** (nco.phaseBits - nco.widthBits);
      const { symbolsPerUpdate, updatesPerSymbol } = words;
      const steps = nco.stepsPerSymbol / updatesPerSymbol;
      const fcw = toNumber(nco.fcw);
      const delayed = words.delay > 0;
      const lastStage = stages.length - 1;
      const { used: lockUsed } = lock;

      let { phase, word, w, e, sum, acc, acc2, counted, stage, symbols, place } = state;
      let gains = gainInDoubles(stages[stage]!, rounding);
      let [pGain, pScale, pHalf, pEven] = gains.proportional;
      let [iGain, iScale, iHalf, iEven] = gains.integral;
      let [jGain, jScale, jHalf, jEven] = gains.integral2;

      for (let k = 0; k < count; k++) {
        const index = Math.floor(phase * address);
        const c = cosine[index]!;
        const s = sine[index]!;
        const iRaised = xI[k]! * c + xQ[k]! * s + rotatorHalf;
        let i = Math.floor(iRaised * rotatorScale);
        if (rotatorEven > 0) i = toEven(i, iRaised, rotatorEven);
        if (i >= sampleTop || i < -sampleTop) i = beyond(i, sampleTop, sampleWraps);
        const qRaised = xQ[k]! * c - xI[k]! * s + rotatorHalf;
        let q = Math.floor(qRaised * rotatorScale);
        if (rotatorEven > 0) q = toEven(q, qRaised, rotatorEven);
        if (q >= sampleTop || q < -sampleTop) q = beyond(q, sampleTop, sampleWraps);
        zI[k] = i;
        zQ[k] = q;
        sum += plainQpsk ? (i < 0 ? -q : q) - (q < 0 ? -i : i) : detector(i, q, known[k]!);
        counted += 1;
        if (lockUsed) lock.add(i, q);

        const updated = counted === symbolsPerUpdate;
        if (updated) {
          const eRaised = sum + errorHalf;
          e = Math.floor(eRaised * errorScale);
          if (errorEven > 0) e = toEven(e, eRaised, errorEven);
          if (e >= errorTop || e < -errorTop) e = beyond(e, errorTop, errorWraps);
          sum = 0;
          counted = 0;
          let turned = 0;
          for (let m = 0; m < updatesPerSymbol; m++) {
            let d = e;
            if (delayed) {
              line[place] = e;
              place = place === line.length - 1 ? 0 : place + 1;
              d = line[place]!;
            }
            if (order > 1) {
              const incrementRaised = d * iGain + iHalf;
              let increment = Math.floor(incrementRaised * iScale);
              if (iEven > 0) increment = toEven(increment, incrementRaised, iEven);
              if (increment >= top || increment < -top) increment = beyond(increment, top, incrementWraps);
              if (order === 3) {
                const jRaised = d * jGain + jHalf;
                let j = Math.floor(jRaised * jScale);
                if (jEven > 0) j = toEven(j, jRaised, jEven);
                if (j >= top2 || j < -top2) j = beyond(j, top2, increment2Wraps);
                acc2 += j;
                if (acc2 >= top2 || acc2 < -top2) acc2 = beyond(acc2, top2, integrator2Wraps);
                increment += Math.floor(acc2 * perGuard2);
                if (increment >= top || increment < -top) increment = beyond(increment, top, incrementWraps);
              }
              acc += increment;
              if (limit >= 0) acc = acc > limit ? limit : acc < -limit ? -limit : acc;
              else if (acc >= top || acc < -top) acc = beyond(acc, top, integratorWraps);
            }
            const pRaised = d * pGain + pHalf;
            let p = Math.floor(pRaised * pScale);
            if (pEven > 0) p = toEven(p, pRaised, pEven);
            if (p >= outputTop || p < -outputTop) p = beyond(p, outputTop, outputWraps);
            w = p + Math.floor(acc * perGuard);
            word = fcw + w;
            word -= Math.floor(word * perSpan) * span;
            phase += word * steps;
            phase -= Math.floor(phase * perSpan) * span;
            turned += w * steps;
          }
          advance[k] = turned + 0;
        } else {
          phase += word * nco.stepsPerSymbol;
          phase -= Math.floor(phase * perSpan) * span;
          advance[k] = w * nco.stepsPerSymbol + 0;
        }
        symbols += 1;
        if (stage < lastStage && stageEnds(stage, symbols, updated)) {
          stage += 1;
          symbols = 0;
          gains = gainInDoubles(stages[stage]!, rounding);
          [pGain, pScale, pHalf, pEven] = gains.proportional;
          [iGain, iScale, iHalf, iEven] = gains.integral;
          [jGain, jScale, jHalf, jEven] = gains.integral2;
        }
        // Adding 0 turns −0 into 0.
        out.e[k] = e;
        out.acc[k] = acc + 0;
        out.accLow[k] = acc;
        out.acc2Low[k] = acc2;
        out.wLow[k] = w;
        out.phaseLow[k] = phase;
        stageOut[k] = stage;
      }
      Object.assign(state, { phase, word, w, e, sum, acc, acc2, counted, stage, symbols, place });
    },
  };
}
