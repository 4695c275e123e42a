// Generated from schemas/config.schema.json; do not edit.

import type { CarrierWords } from './words';
import type { ClockWords } from './words';
import type { Plan } from './plan';

/**
 * config.yaml and config.json: the words of a revision, the registers that hold them, what they mean, and the plan that they come from.
 */
export interface ConfigDocument {
  /**
   * Product that made the file.
   */
  product: string;
  /**
   * Version of the mathematics.
   */
  engine: string;
  /**
   * Name of the plan.
   */
  plan: string;
  /**
   * Revision of the plan.
   */
  revision: number;
  /**
   * Version of the release; null outside one.
   */
  release: string | null;
  /**
   * SHA-256 of the revision.
   */
  digest: string;
  /**
   * What must be done before the numbers reach the air.
   */
  care: string;
  target: ConfigTarget;
  loops: ConfigLoops;
  /**
   * Every integer by its address and what it means, whether or not a register holds it.
   */
  quantities: ConfigQuantity[];
  /**
   * Registers in write order.
   */
  registers: ConfigRegister[];
  words: ConfigWords;
  /**
   * The plan with its defaults filled in.
   */
  description: Plan;
}

/**
 * Hardware whose registers these are.
 */
export interface ConfigTarget {
  /**
   * Short name.
   */
  slug: string;
  /**
   * Name.
   */
  name: string;
  /**
   * Clock of the loop hardware in Hz.
   */
  loopClockHz: number;
  /**
   * Prefix of every C name.
   */
  cPrefix: string;
  /**
   * Base address of the registers.
   */
  baseAddress: string;
  /**
   * Number of the register map.
   */
  mapVersion: number;
  /**
   * Width of a register.
   */
  registerBits: 8 | 16 | 32;
  /**
   * Order of the bytes of a register on the bus.
   */
  byteOrder: 'little' | 'big';
}

/**
 * What the words make.
 */
export interface ConfigLoops {
  carrier?: ConfigLoop;
  clock?: ConfigLoop;
}

/**
 * One loop.
 */
export interface ConfigLoop {
  /**
   * Loop updates per second.
   */
  updateRateHz: number;
  /**
   * Slope of the detector at lock: detector units per radian (carrier) or per symbol (clock).
   */
  detectorGain: number;
  /**
   * Stages in the order in which they run.
   */
  stages: ConfigStage[];
}

/**
 * One stage.
 */
export interface ConfigStage {
  /**
   * Name of the stage.
   */
  name: string;
  noiseBandwidth: ConfigAchieved;
  noiseBandwidthHz: ConfigAchieved;
  damping: ConfigAchieved;
  naturalFrequencyHz: ConfigAchieved;
  /**
   * Phase margin, degrees.
   */
  phaseMarginDeg: number | null;
}

/**
 * Wanted, exact and effective value.
 */
export interface ConfigAchieved {
  /**
   * As the plan asks; null where it does not.
   */
  wanted: number | null;
  /**
   * Unquantised loop with its delay.
   */
  exact: number | null;
  /**
   * From the words.
   */
  effective: number | null;
}

/**
 * One integer.
 */
export interface ConfigQuantity {
  /**
   * Address, for example carrier.track.proportional.mantissa.
   */
  path: string;
  /**
   * Value; the standard code of a choice.
   */
  value: number | string;
  /**
   * Bits that the value takes.
   */
  widthBits: number;
  /**
   * Its field is coded in two's complement.
   */
  signed: boolean;
  /**
   * What it means.
   */
  meaning: string;
}

/**
 * One register.
 */
export interface ConfigRegister {
  /**
   * Name.
   */
  name: string;
  /**
   * Offset from the base address in bytes.
   */
  offset: string;
  /**
   * Address.
   */
  address: string;
  /**
   * Access.
   */
  access: 'read-write' | 'write-only' | 'read-only';
  /**
   * Value after reset.
   */
  reset: string;
  /**
   * Value that the plan writes; absent where it writes none.
   */
  value?: string;
  /**
   * Fields.
   */
  fields: ConfigField[];
}

/**
 * One field.
 */
export interface ConfigField {
  /**
   * Name.
   */
  name: string;
  /**
   * Highest bit.
   */
  high: number;
  /**
   * Lowest bit.
   */
  low: number;
  /**
   * Unsigned, or two's complement.
   */
  coding: 'unsigned' | 'signed';
  /**
   * Value in that coding.
   */
  value: number;
  /**
   * Quantity that it holds.
   */
  quantity?: string;
  /**
   * Lowest bit of it that the field holds.
   */
  quantityLow?: number;
  /**
   * Why the field cannot hold the quantity.
   */
  fault?: string;
}

/**
 * The integers from which the datapath starts.
 */
export interface ConfigWords {
  carrier?: CarrierWords;
  clock?: ClockWords;
}
