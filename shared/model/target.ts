// Generated from schemas/target.schema.json; do not edit.

import type { RegisterMap } from './register-map';

/**
 * A piece of modem hardware or a firmware build.
 */
export interface TargetBody {
  /**
   * Short name in addresses and plans.
   */
  slug: string;
  /**
   * Name of the target.
   */
  name: string;
  /**
   * Clock of the loop hardware in Hz.
   */
  loopClockHz: number;
  /**
   * Prefix of every C name, in capitals with an underscore at its end: CVD_.
   */
  cPrefix: string;
  /**
   * Base address of the registers, hexadecimal.
   */
  baseAddress: string;
  /**
   * Registers.
   */
  registerMap: RegisterMap;
}
