import { bisect } from '../math/root-search';

/** A loop of order 2 as pull-in sees it. */
export interface PullInLoop {
  g1: number;
  g2: number;
  /** Symbols per update: a whole number, or 1/m. */
  updateInterval: number;
  /** Extra pipeline delay, updates. */
  delay: number;
}

export interface PullIn {
  /** Estimate, symbols; null where the loop does not pull in from that offset. */
  symbols: number | null;
  /** Largest offset from which the integrator is driven towards lock, radians of the S-curve's argument per symbol. */
  reach: number;
}

const steps = 48;
const scanSteps = 25;

/**
 * How long the integrator takes to pull a loop in from an offset beyond its lock-in range. While the loop slips, the
 * proportional path turns the oscillator at the beat and so leaves a mean error
 *
 *     ⟨s⟩ = (g1/U)·Σ ½b_n²·c(nMΔω)/Δω,   c(β) = a(β)²·cos(β·λ)·(β/2)/sin(β/2),   λ = max(U, 1) − ½ + U·D
 *
 * with s = Σ b_n·sin(nMx) the S-curve over its slope, Δω per symbol, and a(β) = sin(Uβ/2)/(U·sin(β/2)) the average of
 * U > 1 errors: every symbol of lag turns the beat further, and from Δω = π/(2Mλ) on the integrator is driven away.
 * The integrator moves by g2·⟨s⟩/U² per symbol, so
 *
 *     t = ∫ U³·ω dω/(g1·g2·Σ ½b_n²·c(nMω))   from 0 to Δω
 *
 * which is Δω²/(4ζωn³⟨s²⟩) where nothing lags.
 *
 * @param powers ½b_n², n = 1, 2 …; their sum is ⟨s²⟩
 * @param period of the S-curve, 2π/M for a carrier
 * @param offset Δω, argument of the S-curve per symbol, 0 or more
 * @see F. Gardner, "Phaselock Techniques", 3rd ed. 2005, for pull-in without delay; derived for the lag
 */
export function pullIn(loop: PullInLoop, powers: readonly number[], period: number, offset: number): PullIn {
  const pull = pullAt(loop, powers, period);
  const reach = firstZero(pull, loop, period);
  if (!(offset < reach)) return { symbols: null, reach };
  const step = offset / steps;
  let sum = 0;
  for (let k = 0; k < steps; k += 1) sum += ((k + 0.5) * step * step) / pull((k + 0.5) * step);
  const { g1, g2, updateInterval } = loop;
  const symbols = (sum * updateInterval ** 3) / (g1 * g2);
  return { symbols: Number.isFinite(symbols) ? symbols : null, reach };
}

/** λ: symbols from an error to the middle of the turn that it makes. */
const lagOf = ({ updateInterval, delay }: PullInLoop): number =>
  Math.max(updateInterval, 1) - 0.5 + updateInterval * delay;

/** Σ ½b_n²·c(nMω). */
function pullAt(loop: PullInLoop, powers: readonly number[], period: number) {
  const counted = Math.max(loop.updateInterval, 1);
  const lag = lagOf(loop);
  const share = (beat: number): number => {
    const half = beat / 2;
    const sine = Math.sin(half);
    if (Math.abs(sine) < 1e-12) return Math.cos(beat * lag);
    return (Math.sin(counted * half) / (counted * sine)) ** 2 * ((Math.cos(beat * lag) * half) / sine);
  };
  return (omega: number): number => {
    const beat = (2 * Math.PI * omega) / period;
    return powers.reduce((sum, power, i) => sum + power * share((i + 1) * beat), 0);
  };
}

/**
 * Where the pull first turns round. The first harmonic does at a quarter turn of lag, and the others move that little;
 * the beat is at most half a turn per symbol.
 */
function firstZero(pull: (omega: number) => number, loop: PullInLoop, period: number): number {
  const most = Math.min((1.25 * period) / (4 * lagOf(loop)), period / 2);
  const at = (k: number): number => (most * k) / scanSteps;
  for (let k = 1; k <= scanSteps; k += 1) if (!(pull(at(k)) > 0)) return bisect(pull, at(k - 1), at(k));
  return most;
}
