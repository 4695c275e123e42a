import { sampleLsbLog2 } from '../fixed-point/tables';
import type { CarrierWords } from '../model/words';
import { gaussian } from './gaussian';
import { onCircle, powerRatio } from './portable-math';
import type { TrialRandom } from './random';
import type { SymbolSource } from './source';

export interface ChannelSettings {
  words: CarrierWords;
  source: SymbolSource;
  /** Amplitude A of the symbols, sample units. */
  amplitude: number;
  /** Es/N0 in dB; the noise of each rail has variance A²/(2γ). */
  esN0Db: number;
  /** Carrier, turns per symbol, centre frequency included. */
  turnsPerSymbol: number;
  /** Carrier phase at the first symbol, turns. */
  firstTurns: number;
}

/** Turns symbols into received samples, one each: x = A·a·e^(jψ) + n, rounded to sample LSB and clipped as a converter does. */
export interface Channel {
  /** Writes the samples of the next `count` symbols. */
  pass(random: TrialRandom, indices: Uint8Array, count: number, xI: Int32Array, xQ: Int32Array): void;
}

export function channel({ words, source, amplitude, esN0Db, turnsPerSymbol, firstTurns }: ChannelSettings): Channel {
  const perLsb = 2 ** -sampleLsbLog2(words);
  const noise = (amplitude * perLsb) / Math.sqrt(2 * powerRatio(esN0Db));
  const levelI = Float64Array.from(source.points, ([i]) => amplitude * perLsb * i);
  const levelQ = Float64Array.from(source.points, ([, q]) => amplitude * perLsb * q);
  const top = 2 ** (words.sampleBits - 1) - 1;
  const [stepC, stepS] = onCircle(turnsPerSymbol);
  let done = 0;

  return {
    pass(random, indices, count, xI, xQ) {
      // The carrier turns by multiplication within a block and starts each block from its angle, so no error builds up.
      let [c, s] = onCircle(firstTurns + wholeTurnsOff(done * turnsPerSymbol));
      for (let k = 0; k < count; k++) {
        const aI = levelI[indices[k]!]!;
        const aQ = levelQ[indices[k]!]!;
        xI[k] = sample(aI * c - aQ * s + noise * gaussian(random), top);
        xQ[k] = sample(aI * s + aQ * c + noise * gaussian(random), top);
        const turned = c * stepC - s * stepS;
        s = s * stepC + c * stepS;
        c = turned;
      }
      done += count;
    },
  };
}

const wholeTurnsOff = (turns: number): number => turns - Math.floor(turns);

/** Nearest sample word, saturated. */
function sample(value: number, top: number): number {
  const rounded = Math.floor(value + 0.5);
  if (rounded > top) return top;
  return rounded < -top - 1 ? -top - 1 : rounded;
}
