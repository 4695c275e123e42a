/** How one trial ended. */
export type Outcome = 'locked' | 'false-lock' | 'unlocked';

export interface WatchSettings {
  /** Rotational symmetry M of the modulation; phase errors are counted in periods of 1/M turn. */
  power: number;
  /** Carrier offset applied, turns per symbol. */
  turnsPerSymbol: number;
  /** Phase error at the first symbol, turns. */
  firstTurns: number;
  /** One NCO LSB in turns, 2^−Wn. */
  turnsPerLsb: number;
  /** Symbols of the trial. */
  symbols: number;
}

export interface TrialResult {
  outcome: Outcome;
  /** Symbols until the phase error stayed within half a period of its last null; of the trials that locked. */
  lockTimeSymbols: number;
  /** Applied less settled frequency, turns per symbol. */
  residualTurns: number;
  /** Sums over the settled part of the phase error from its null, periods. */
  errorSum: number;
  errorSquares: number;
  /** Cycle slips in the settled part. */
  cycleSlips: number;
}

/** Symbols at the end of a trial over which it has to be settled: the last fifth. */
export const settledSymbols = (symbols: number): number => Math.floor(symbols / 5);

/**
 * Mean error of a loop that is locked, periods, at most: decided points have false nulls further off (16QAM at a third
 * of a period), and drift or a rounded word never holds a loop that far from its own.
 */
const largestBias = 0.2;

/**
 * Watches the true phase error of a trial. A loop that sees one sample a symbol cannot tell an error that moves by
 * whole periods from one that rests, so the error is followed modulo whole periods per symbol: what rests in the
 * settled part is quiet, and the settled frequency and the mean error then tell lock from false lock.
 */
export class PhaseWatch {
  /** Phase error in periods, followed without jumps. */
  error: number;
  private symbol = 0;
  private null0: number;
  private lastChange = 0;
  private slipNull = 0;
  private slips = 0;
  private advanced = 0;
  private sum = 0;
  private squares = 0;
  private largest = -Infinity;
  private least = Infinity;
  private readonly settledFrom: number;

  constructor(private readonly settings: WatchSettings) {
    this.error = settings.power * settings.firstTurns;
    this.null0 = Math.round(this.error);
    this.settledFrom = settings.symbols - settledSymbols(settings.symbols);
  }

  /** Takes the NCO's advance at each of the next `count` symbols, LSB; writes the errors before it when asked. */
  add(advance: Float64Array, count: number, errors?: Float64Array): void {
    const { power, turnsPerSymbol, turnsPerLsb } = this.settings;
    const drift = power * turnsPerSymbol;
    const perLsb = power * turnsPerLsb;
    for (let k = 0; k < count; k++) {
      if (errors) errors[k] = this.error;
      this.see(this.error);
      const moved = drift - perLsb * advance[k]!;
      this.error += moved - Math.floor(moved + 0.5);
      if (this.symbol >= this.settledFrom) this.advanced += advance[k]!;
      this.symbol += 1;
    }
  }

  private see(error: number): void {
    const off = error - this.null0;
    if (off >= 0.5 || off < -0.5) {
      this.null0 = Math.floor(error + 0.5);
      this.lastChange = this.symbol;
    }
    if (this.symbol < this.settledFrom) return;
    if (this.symbol === this.settledFrom) this.slipNull = this.null0;
    const slip = error - this.slipNull;
    if (slip >= 1 || slip <= -1) {
      const next = Math.floor(error + 0.5);
      this.slips += Math.abs(next - this.slipNull);
      this.slipNull = next;
    }
    this.sum += error;
    this.squares += error * error;
    if (error > this.largest) this.largest = error;
    if (error < this.least) this.least = error;
  }

  result(): TrialResult {
    const { power, turnsPerSymbol, turnsPerLsb, symbols } = this.settings;
    const count = settledSymbols(symbols);
    const residualTurns = turnsPerSymbol - (this.advanced / count) * turnsPerLsb;
    const centre = this.null0;
    const quiet = this.largest - centre < 0.5 && this.least - centre >= -0.5;
    const sound = Math.abs(residualTurns * power) < 0.5 && Math.abs(this.sum / count - centre) < largestBias;
    return {
      outcome: quiet ? (sound ? 'locked' : 'false-lock') : 'unlocked',
      lockTimeSymbols: this.lastChange,
      residualTurns,
      errorSum: this.sum - count * centre,
      errorSquares: this.squares - 2 * centre * this.sum + count * centre * centre,
      cycleSlips: this.slips,
    };
  }
}
