import type { LoopDesign } from '../model/design';
import type { Plan } from '../model/plan';
import type { CarrierWords, ClockWords } from '../model/words';

export type LoopName = 'carrier' | 'clock';

/** One integer that a register field can hold. */
export interface Quantity {
  /** Address, for example `carrier.track.proportional.mantissa`. */
  path: string;
  label: string;
  /** It can be negative, so that its field is coded in two's complement. */
  signed: boolean;
  /** Names of an enumerated quantity; the place in the list is the standard code. */
  choices?: readonly string[];
  /** JSON pointer of the plan's field that sets its size or its value. */
  planPointer: string;
}

/** A quantity with the integer that a plan's words give it. */
export interface QuantityValue extends Quantity {
  value: bigint;
  /** Name of the choice that the value stands for. */
  choice?: string;
  /** Bits that the value takes, its sign counted where the quantity is signed. */
  widthBits: number;
  /** What the integer means in physical units; empty where the label says all. */
  meaning: string;
  /** The plan's loop needs it: hardware that lacks it runs another loop. */
  required: boolean;
}

/** One loop of a plan, worked out, whose words the quantities are read from. */
export interface LoopSource<Words extends CarrierWords | ClockWords = CarrierWords | ClockWords> {
  plan: Plan;
  loop: LoopDesign;
  words: Words;
}

/** How one quantity is read; `name` stands after the loop, or after the stage. */
export interface Definition<Source> {
  name: string;
  label: string;
  signed?: boolean;
  choices?: readonly string[];
  /** Pointer below the loop's own in the plan; absolute when it begins with `//`. */
  pointer: string;
  read: (source: Source) => bigint | number | string;
  meaning?: (source: Source) => string;
  required?: (source: Source) => boolean;
}

/** Least width of a word that holds the value: two's complement when signed, at least one bit. */
export function widthOf(value: bigint, signed: boolean): number {
  const magnitude = value < 0n ? -value - 1n : value;
  const bits = magnitude === 0n ? 0 : magnitude.toString(2).length;
  return Math.max(1, signed ? bits + 1 : bits);
}
