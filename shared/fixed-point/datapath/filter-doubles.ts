import type { CarrierWords } from '../../model/words';
import { toNumber } from '../format';
import { doubleShift, doubleWord, fitDouble, shiftDouble, type DoubleShift, type DoubleWord } from './double-arithmetic';

/** The loop filter in doubles; `update` returns w. */
export class FilterDoubles {
  acc = 0;
  acc2 = 0;
  private readonly line: Float64Array;
  private place = 0;
  private readonly limit: number;
  private readonly perGuard: number;
  private readonly perGuard2: number;
  private readonly outputWord: DoubleWord;
  private readonly incrementWord: DoubleWord;
  private readonly integratorWord: DoubleWord;
  private readonly increment2Word: DoubleWord;
  private readonly integrator2Word: DoubleWord;
  private proportional = 0;
  private integral = 0;
  private integral2 = 0;
  private proportionalShift: DoubleShift;
  private integralShift: DoubleShift;
  private integral2Shift: DoubleShift;

  constructor(
    private readonly words: CarrierWords,
    outputBits: number,
  ) {
    const { overflow, integratorBits, integrator2Bits, integratorLimit } = words;
    this.line = new Float64Array(words.delay + 1);
    this.limit = integratorLimit === null ? -1 : toNumber(integratorLimit);
    this.perGuard = 2 ** -words.guardBits;
    this.perGuard2 = 2 ** -words.guard2Bits;
    this.outputWord = doubleWord(outputBits, overflow.proportional);
    this.incrementWord = doubleWord(integratorBits, overflow.increment);
    this.integratorWord = doubleWord(integratorBits, overflow.integrator);
    this.increment2Word = doubleWord(integrator2Bits, overflow.increment2);
    this.integrator2Word = doubleWord(integrator2Bits, overflow.integrator2);
    this.proportionalShift = this.integralShift = this.integral2Shift = doubleShift(0, 'floor');
    this.load(0);
  }

  /** Takes the gain words of a stage; nothing else changes. */
  load(stage: number): void {
    const { proportional, integral, integral2 } = this.words.stages[stage]!;
    const { rounding } = this.words;
    this.proportional = proportional.mantissa;
    this.integral = integral.mantissa;
    this.integral2 = integral2.mantissa;
    this.proportionalShift = doubleShift(proportional.shift, rounding);
    this.integralShift = doubleShift(integral.shift, rounding);
    this.integral2Shift = doubleShift(integral2.shift, rounding);
  }

  update(error: number): number {
    const d = this.delayed(error);
    if (this.words.order > 1) this.integrate(d);
    const p = fitDouble(shiftDouble(d * this.proportional, this.proportionalShift), this.outputWord);
    return p + Math.floor(this.acc * this.perGuard);
  }

  private delayed(error: number): number {
    this.line[this.place] = error;
    this.place = this.place + 1 === this.line.length ? 0 : this.place + 1;
    return this.line[this.place]!;
  }

  private integrate(d: number): void {
    let increment = fitDouble(shiftDouble(d * this.integral, this.integralShift), this.incrementWord);
    if (this.words.order === 3) {
      const j = fitDouble(shiftDouble(d * this.integral2, this.integral2Shift), this.increment2Word);
      this.acc2 = fitDouble(this.acc2 + j, this.integrator2Word);
      increment = fitDouble(increment + Math.floor(this.acc2 * this.perGuard2), this.incrementWord);
    }
    const next = this.acc + increment;
    if (this.limit < 0) this.acc = fitDouble(next, this.integratorWord);
    else this.acc = next > this.limit ? this.limit : next < -this.limit ? -this.limit : next;
  }
}

export const filterInDoubles = (words: CarrierWords, outputBits: number) => new FilterDoubles(words, outputBits);
