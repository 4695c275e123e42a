import type { ClockWords } from '../../model/words';
import { fit, toBigInt, wrapUnsigned } from '../format';
import { interpolatorTable, type InterpolatorTable } from '../interpolator-table';
import { roundShift } from '../rounding';
import { inLock, lockDetector } from './lock-detector';
import { loopFilter, type FilterNodes } from './loop-filter';
import type { ExactSample } from './phase-detector';
import { stageSequence } from './stage-sequence';
import { timingDetector, timingLsbLog2 } from './timing-detector';

/** A sample taken between samples: the strobe of a symbol, or the one half-way between two. */
export interface Interpolant {
  kind: 'strobe' | 'half-way';
  /** Fractional interval, 2^−F of a sample. */
  mu: number;
  value: ExactSample;
}

/** Every node of the clock datapath at the end of one sample. */
export interface ClockStep {
  interpolants: Interpolant[];
  /** Of the strobe in this sample, where it ended a loop update. */
  update?: FilterNodes & { e: bigint };
  /** Stage in use after a strobe. */
  stage?: number;
  eta: bigint;
}

/** The clock loop to the bit, in unbounded integers. */
export interface ClockDatapath {
  /** @param x the newest sample; interpolation is around the one that came two samples before it */
  step(x: readonly [number, number]): ClockStep;
}

/** @param table the coefficients kept beside the words; worked out again when absent */
export function clockDatapath(words: ClockWords, table: InterpolatorTable = interpolatorTable(words)): ClockDatapath {
  const { counter, hold } = words;
  const width = BigInt(counter.widthBits);
  const nominal = toBigInt(counter.nominalStep);
  const half = 1n << (width - 1n);
  const most = (1n << width) - 1n;
  const interpolate = interpolator(words, table);
  const symbol = symbolEnd(words);
  let eta = 0n;
  let control = 0n;

  return {
    step(x) {
      const step = clamp(nominal - control, 1n, most);
      if (!hold) control = 0n;
      const at = (kind: Interpolant['kind'], place: bigint) => {
        const mu = Number((place << BigInt(counter.fractionBits)) / step);
        return { kind, mu, place };
      };
      interpolate.push(x);
      const result: ClockStep = { interpolants: [], eta };
      const due = [at('strobe', eta), at('half-way', wrapUnsigned(eta + half, counter.widthBits))]
        .filter(({ place }) => place < step)
        .sort((a, b) => (a.place < b.place ? -1 : 1));
      for (const { kind, mu } of due) {
        const value = interpolate.at(mu);
        result.interpolants.push({ kind, mu, value });
        if (kind === 'half-way') symbol.between(value);
        else Object.assign(result, symbol.strobe(value));
      }
      if (result.update) control = result.update.w;
      eta = wrapUnsigned(eta - step, counter.widthBits);
      return { ...result, eta };
    },
  };
}

/** Four samples and the sum of products over them, each rail rounded and fitted once. */
function interpolator({ tableBits, sampleBits, overflow, rounding }: ClockWords, { coefficients }: InterpolatorTable) {
  const line: ExactSample[] = Array.from({ length: 4 }, () => [0n, 0n]);
  const rail = (taps: readonly bigint[], k: 0 | 1): bigint => {
    const sum = taps.reduce((total, tap, n) => total + tap * line[n]![k], 0n);
    return fit(roundShift(sum, tableBits - 2, rounding), sampleBits, overflow.sample);
  };
  return {
    push([i, q]: readonly [number, number]): void {
      line.shift();
      line.push([BigInt(i), BigInt(q)]);
    },
    at(mu: number): ExactSample {
      const taps = coefficients[mu]!.map(BigInt);
      return [rail(taps, 0), rail(taps, 1)];
    },
  };
}

/** Detector, loop filter, lock detector and stages: what happens once a symbol. */
function symbolEnd(words: ClockWords) {
  const { errorBits, overflow, rounding, symbolsPerUpdate, counter } = words;
  const detect = timingDetector(words);
  const errorShift = words.errorFullScaleLog2 - (errorBits - 1) - timingLsbLog2(words);
  const filter = loopFilter(words, counter.widthBits);
  const lock = lockDetector(words);
  const stages = stageSequence(words.stages);
  let before: ExactSample = [0n, 0n];
  let middle: ExactSample = [0n, 0n];
  let sum = 0n;
  let counted = 0;

  const update = () => {
    const e = fit(roundShift(sum, errorShift, rounding), errorBits, overflow.error);
    sum = 0n;
    counted = 0;
    return { e, ...filter.update(e, stages.stage) };
  };

  return {
    between(value: ExactSample): void {
      middle = value;
    },
    strobe(y: ExactSample): Pick<ClockStep, 'update' | 'stage'> {
      sum += detect(y, before, middle);
      before = y;
      counted += 1;
      const block = lock(y);
      const nodes = counted === symbolsPerUpdate ? update() : undefined;
      stages.endSymbol(nodes !== undefined, block && ((threshold) => inLock(block, threshold)));
      return nodes ? { update: nodes, stage: stages.stage } : { stage: stages.stage };
    },
  };
}

function clamp(value: bigint, least: bigint, most: bigint): bigint {
  if (value < least) return least;
  return value > most ? most : value;
}
