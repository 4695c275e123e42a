/** Nodes of a run of symbols, one element a symbol; those named `low` hold the low 32 bits of a wider node. */
export interface CarrierNodes {
  zI: Int32Array;
  zQ: Int32Array;
  /** Of the newest update, as are acc, acc2 and w. */
  e: Int32Array;
  accLow: Int32Array;
  acc2Low: Int32Array;
  wLow: Int32Array;
  phaseLow: Int32Array;
  /** Integrator as the nearest double, in its own LSB. */
  acc: Float64Array;
  /** NCO steps of the symbol, each times the loop word w then in use, as the nearest double: NCO LSB. */
  advance: Float64Array;
  stage: Uint8Array;
}

/** The carrier datapath over runs of symbols; the state goes on from one run to the next. */
export interface CarrierRunner {
  /** @param known index of each symbol sent, for `known-symbols` · @param count symbols to run, at most the arrays' length */
  run(xI: Int32Array, xQ: Int32Array, known: Uint8Array, count: number, out: CarrierNodes): void;
}

export function carrierNodes(length: number): CarrierNodes {
  const ints = () => new Int32Array(length);
  return {
    zI: ints(),
    zQ: ints(),
    e: ints(),
    accLow: ints(),
    acc2Low: ints(),
    wLow: ints(),
    phaseLow: ints(),
    acc: new Float64Array(length),
    advance: new Float64Array(length),
    stage: new Uint8Array(length),
  };
}
