// Generated from schemas/register-map.schema.json; do not edit.

/**
 * Registers of a target and what their fields hold.
 */
export interface RegisterMap {
  /**
   * Width of a register.
   */
  wordBits?: 8 | 16 | 32;
  /**
   * Order of the bytes of a register on the bus; for the reader, the header writes whole registers.
   */
  byteOrder?: 'little' | 'big';
  /**
   * Registers in the order in which they are written.
   *
   * @maxItems 1024
   */
  registers: Register[];
}

/**
 * One register.
 */
export interface Register {
  /**
   * Name, a C identifier.
   */
  name: string;
  /**
   * Offset from the base address in bytes.
   */
  offset: number;
  /**
   * Access; a read-only register is never written.
   */
  access?: 'read-write' | 'write-only' | 'read-only';
  /**
   * What the reader of the map should know.
   */
  note?: string;
  /**
   * Reset value of the bits that no field holds, in their place; they are written with it.
   */
  reserved?: number;
  /**
   * Fields.
   *
   * @maxItems 32
   */
  fields: Field[];
}

/**
 * A run of bits of one register. Bound to a quantity or to a constant, else it keeps its reset value.
 */
export interface Field {
  /**
   * Name, a C identifier.
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
   * Quantity that the field holds, for example carrier.track.proportional.mantissa.
   */
  quantity?: string;
  /**
   * Lowest bit of the quantity that the field holds, where a quantity spans several fields.
   */
  quantityLow?: number;
  /**
   * Integer for each choice of an enumerated quantity, where the hardware's differs from the standard one.
   */
  codes?: {
    /**
     * Integer that the field holds.
     */
    [k: string]: number;
  };

  /**
   * Constant that is always written.
   */
  constant?: number;
  /**
   * Unsigned, or two's complement.
   */
  coding?: 'unsigned' | 'signed';
  /**
   * Value after reset, in the coding of the field.
   */
  reset?: number;
}
