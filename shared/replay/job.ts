import { fitsDoubles } from '../fixed-point/datapath/fits-doubles';
import type { CarrierTables } from '../fixed-point/tables';
import type { ToleranceCheck } from '../model/tolerance-check';
import type { CarrierWords } from '../model/words';
import { ParameterError } from '../parameter-error';
import { numberText } from '../quantities/format';

/** A tolerance check with its offsets written out. */
export interface ReplayCheck {
  offsetsHz: number[];
  esN0Db: number[];
  symbols: number;
  trials: number;
  seed: number;
  limits: { lockProbability: number; confidence: number };
}

/** All that a replay depends on, plain JSON: words and tables as a revision keeps them, and the signal around them. */
export interface ReplayJob {
  words: CarrierWords;
  tables: CarrierTables;
  symbolRateBd: number;
  /** As in the plan or as in the words: 'QPSK' or 'qpsk'. */
  modulation: string;
  /** Amplitude A of the symbols, sample units, E|a|² = 1. */
  amplitude: number;
  check: ReplayCheck;
}

/** One point of the grid. */
export interface GridPoint {
  index: number;
  offsetHz: number;
  esN0Db: number;
}

/** Most symbols that one replay may run, over all its points and trials. */
export const mostSymbols = 2e10;

/** The same where no double holds the words and every node is an unbounded integer. */
const mostSymbolsInIntegers = 1e9;

/** Writes the evenly spaced offsets of a check out, from start to stop. */
export function replayCheck(check: ToleranceCheck): ReplayCheck {
  const { carrierOffsetHz, esN0Db = [10], symbols = 20000, trials = 400, seed = 1, limits } = check;
  const { lockProbability = 0.99, confidence = 0.95 } = limits ?? {};
  const offsetsHz = evenlySpaced(carrierOffsetHz);
  return { offsetsHz, esN0Db: [...esN0Db], symbols, trials, seed, limits: { lockProbability, confidence } };
}

/** Weighting both ends keeps offsets that are symmetrical about 0 exactly so. */
function evenlySpaced({ start, stop, points = 21 }: ToleranceCheck['carrierOffsetHz']): number[] {
  if (points === 1) return [start];
  const last = points - 1;
  return Array.from({ length: points }, (_, k) => (start * (last - k) + stop * k) / last + 0);
}

export const pointCount = ({ check }: Pick<ReplayJob, 'check'>): number => check.esN0Db.length * check.offsetsHz.length;

/** Index = Es/N0 index times the number of offsets, plus offset index. @throws {ParameterError} outside the grid */
export function pointAt(job: Pick<ReplayJob, 'check'>, index: number): GridPoint {
  const { offsetsHz, esN0Db } = job.check;
  if (!Number.isInteger(index) || index < 0 || index >= pointCount(job)) {
    throw new ParameterError('point', `the replay has points 0 to ${pointCount(job) - 1}`);
  }
  const offset = index % offsetsHz.length;
  return { index, offsetHz: offsetsHz[offset]!, esN0Db: esN0Db[(index - offset) / offsetsHz.length]! };
}

/**
 * Refuses a check that would run more than 2·10^10 symbols, or more than `most`.
 *
 * @throws {ParameterError} naming `/trials`
 */
export function assertAffordable(check: ToleranceCheck, most = mostSymbols): void {
  const { offsetsHz, esN0Db, symbols, trials } = replayCheck(check);
  const perTrial = offsetsHz.length * esN0Db.length * symbols;
  if (perTrial * trials <= most) return;
  const affordable = Math.floor(most / perTrial);
  throw new ParameterError(
    '/trials',
    `the check runs ${numberText(perTrial * trials)} symbols, the most is ${numberText(most)}: ` +
      (affordable > 0
        ? `at most ${affordable} trials with these points and symbols`
        : 'ask for fewer points or symbols'),
  );
}

/**
 * Refuses what the simulator does not cover: it has one sample a symbol, so no OQPSK.
 *
 * @throws {ParameterError} with a pointer into the plan, or `/trials` for more work than the words allow
 */
export function assertReplayable(job: ReplayJob): void {
  const { words, tables, modulation, check } = job;
  if (modulation.toLowerCase() === 'oqpsk') {
    throw new ParameterError('/signal/modulation', 'a replay does not cover OQPSK yet: it has one sample a symbol');
  }
  if (!fitsDoubles(words, tables).fits) {
    const { offsetsHz, ...rest } = check;
    const carrierOffsetHz = { start: offsetsHz[0]!, stop: offsetsHz.at(-1)!, points: offsetsHz.length };
    assertAffordable({ name: 'replay', carrierOffsetHz, ...rest }, mostSymbolsInIntegers);
  }
}
