import type { Modulation } from './modulations';

/** The signal at a timing detector. */
export interface ClockSignal {
  modulation: Modulation;
  /** Amplitude A of the symbols, above 0. */
  amplitude: number;
  /** Es/N0 γ as a ratio, above 0; noise of variance A²/(2γ) on each rail. */
  esN0: number;
  /** Roll-off α of the raised-cosine pulse, 0 to 1. */
  rollOff: number;
  samplesPerSymbol: number;
  /** Radii of the outer rings of APSK over the inner one; the usual ones where there are none. */
  ringRatios?: readonly number[] | undefined;
}
