import type { CarrierWords } from '../../model/words';
import { fit, toBigInt, wrapUnsigned } from '../format';
import { roundShift } from '../rounding';
import { wholeCircle } from '../rotator-table';
import { carrierTables, type CarrierTables } from '../tables';
import { inLock, lockDetector } from './lock-detector';
import { loopFilter, type FilterNodes } from './loop-filter';
import { detectorLsbLog2, phaseDetector, type ExactSample } from './phase-detector';
import { stageSequence } from './stage-sequence';

/** Nodes after one loop update; `word` is the frequency word that the NCO takes. */
export interface CarrierUpdate extends FilterNodes {
  e: bigint;
  word: bigint;
}

/** Every node of the carrier datapath at the end of one symbol. */
export interface CarrierStep {
  z: ExactSample;
  updates: CarrierUpdate[];
  phase: bigint;
  stage: number;
}

export interface CarrierInput {
  /** Sample at the symbol, integers of `sampleBits` each rail. */
  x: readonly [number, number];
  /** Sample half a symbol later (OQPSK), turned by the same phase: it is read before the NCO steps. */
  half?: readonly [number, number];
  /** Index of the symbol sent, for `known-symbols`. */
  known?: number;
}

/** The carrier loop to the bit, in unbounded integers: the reference for every faster form. */
export interface CarrierDatapath {
  step(input: CarrierInput): CarrierStep;
}

/** @param tables the integer tables kept beside the words; worked out again when absent */
export function carrierDatapath(words: CarrierWords, tables: CarrierTables = carrierTables(words)): CarrierDatapath {
  const { nco, symbolsPerUpdate, updatesPerSymbol, errorBits, overflow, rounding } = words;
  const rotate = rotator(words, tables);
  const detect = phaseDetector(words, tables.decision);
  const errorShift = words.errorFullScaleLog2 - (errorBits - 1) - detectorLsbLog2(words);
  const filter = loopFilter(words, nco.widthBits);
  const lock = lockDetector(words);
  const stages = stageSequence(words.stages);
  const fcw = toBigInt(nco.fcw);
  let phase = 0n;
  let word = 0n;
  let sum = 0n;
  let counted = 0;

  const turn = (steps: number): void => {
    phase = wrapUnsigned(phase + word * BigInt(steps), nco.widthBits);
  };
  const update = (): CarrierUpdate[] => {
    const e = fit(roundShift(sum, errorShift, rounding), errorBits, overflow.error);
    sum = 0n;
    counted = 0;
    return Array.from({ length: updatesPerSymbol }, () => {
      const nodes = filter.update(e, stages.stage);
      word = wrapUnsigned(fcw + nodes.w, nco.widthBits);
      turn(nco.stepsPerSymbol / updatesPerSymbol);
      return { e, ...nodes, word };
    });
  };

  return {
    step({ x, half = [0, 0], known = 0 }) {
      const z = rotate(x, phase);
      sum += detect(z, rotate(half, phase), known);
      counted += 1;
      const block = lock(z);
      const updated = counted === symbolsPerUpdate;
      const updates = updated ? update() : [];
      if (!updated) turn(nco.stepsPerSymbol);
      stages.endSymbol(updated, block && ((threshold) => inLock(block, threshold)));
      return { z, updates, phase, stage: stages.stage };
    },
  };
}

type Rotate = (x: readonly [number, number], phase: bigint) => ExactSample;

/** x·e^(−jθ̂), each rail rounded and fitted once. */
function rotator({ nco, tableBits, sampleBits, overflow, rounding }: CarrierWords, tables: CarrierTables): Rotate {
  const circle = wholeCircle(tables);
  const address = BigInt(nco.widthBits - nco.phaseBits);
  const rail = (value: bigint) => fit(roundShift(value, tableBits - 2, rounding), sampleBits, overflow.sample);
  return ([xI, xQ], phase) => {
    const index = Number(phase >> address);
    const [c, s] = [BigInt(circle.cosine[index]!), BigInt(circle.sine[index]!)];
    const [i, q] = [BigInt(xI), BigInt(xQ)];
    return [rail(i * c + q * s), rail(q * c - i * s)];
  };
}
