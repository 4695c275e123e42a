import { describe, expect, it } from 'vitest';
import { clockDatapath } from '../../../shared/fixed-point/datapath/clock-exact';
import { clockGains, clockOscillatorGain } from '../../../shared/fixed-point/loop-scale';
import { clockWords } from '../../../shared/fixed-point/words';
import type { ClockWords, ClockWordsInput } from '../../../shared/fixed-point/words';
import { gardnerLink } from './link';

const wordsOf = (change: Partial<ClockWordsInput['clock']>, samplesPerSymbol: number, stages = gardnerLink.stages) =>
  clockWords({
    ...gardnerLink,
    signal: { ...gardnerLink.signal, samplesPerSymbol, sampleBits: 24, sampleFullScaleLog2: 0 },
    clock: { ...gardnerLink.clock, ...change },
    stages,
  });

/** Drift of the strobes, symbols, over so many symbols of a ramp, on which ŝ′y − ŝy′ is the same at every strobe. */
function drift(words: ClockWords, samplesPerSymbol: number, symbols: number): { drift: number; control: number } {
  const datapath = clockDatapath(words);
  const cycle = 2 ** words.counter.widthBits;
  let [passed, before, control] = [0, 0, 0];
  for (let t = 0; t < symbols * samplesPerSymbol; t += 1) {
    const { eta, update } = datapath.step([4000 + 40 * t, 4000 + 40 * t]);
    // The counter steps down by less than one cycle a sample.
    passed += (((before - Number(eta)) % cycle) + cycle) % cycle;
    before = Number(eta);
    if (update) control += Number(update.w);
  }
  return { drift: (symbols * cycle - passed) / cycle, control };
}

describe('the control word of a clock loop', () => {
  // Derived: with hold a word acts on all N samples of a symbol, K0 = N/2^Wc symbols per LSB, without on one, 1/2^Wc.
  // The datapath itself is run, proportional path alone; a strobe late by 1 % changes the ramp's error as little.
  it.each([
    [true, 2],
    [false, 2],
    [true, 4],
    [false, 4],
    [true, 8],
  ])('moves the strobe by its oscillator gain, hold %s, %i samples per symbol', (hold, samplesPerSymbol) => {
    const clock = { detector: 'mueller-muller', interpolator: 'linear', hold, order: 1 } as const;
    const words = wordsOf(clock, samplesPerSymbol, [{ g1: 0.05, g2: 0, untilSymbols: null, lockThreshold: null }]);
    const run = drift(words, samplesPerSymbol, 400);
    expect(Math.abs(run.control)).toBeGreaterThan(0);
    const moved = run.drift / run.control / clockOscillatorGain(words, samplesPerSymbol);
    expect(Math.abs(moved - 1)).toBeLessThan(0.02);
  });

  it.each([
    [true, 2],
    [false, 2],
    [true, 6],
    [false, 6],
  ])('is scaled so that the loop is the wanted one, hold %s, %i samples per symbol', (hold, samplesPerSymbol) => {
    const words = wordsOf({ hold }, samplesPerSymbol);
    const [gains] = clockGains(words, gardnerLink.detectorGain, samplesPerSymbol);
    expect(gains!.g1 / gardnerLink.stages[0]!.g1).toBeCloseTo(1, 3);
    expect(gains!.g2 / gardnerLink.stages[0]!.g2!).toBeCloseTo(1, 3);
  });

  // Derived (reference page): zeros inserted in the place of the held word give ζ/√N and ωn/√N; for small gains
  // ζ = g1/(2√g2) and ωn·T = √g2.
  it.each([2, 4])('that is meant to be held gives ζ/√N and ωn/√N where it is not, N = %i', (samplesPerSymbol) => {
    const words = wordsOf({ hold: true }, samplesPerSymbol);
    const analog = (loop: ClockWords) => {
      const [gains] = clockGains(loop, gardnerLink.detectorGain, samplesPerSymbol);
      return { zeta: gains!.g1 / (2 * Math.sqrt(gains!.g2)), omega: Math.sqrt(gains!.g2) };
    };
    const [held, inserted] = [analog(words), analog({ ...words, hold: false })];
    expect(inserted.zeta / held.zeta).toBeCloseTo(1 / Math.sqrt(samplesPerSymbol), 12);
    expect(inserted.omega / held.omega).toBeCloseTo(1 / Math.sqrt(samplesPerSymbol), 12);
  });
});
