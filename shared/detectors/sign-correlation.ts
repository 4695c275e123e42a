import { sampledCorrelation, raisedCosine } from './pulse';
import { railPower } from './rails';
import type { Rail } from './rails';

export interface SignCorrelation {
  rail: Rail;
  rollOff: number;
  /** Noise of the rail, above 0. */
  variance: number;
  /** How early the strobe comes, symbols. */
  early: number;
  /** w(k): what the mean of a_k·sgn y counts for. */
  weight: (k: number) => number;
  /** Σ g(−x − k)·w(k) over all whole k. */
  weighted: number;
}

/** Symbols on either side of the strobe whose levels are told apart; all others together are taken as normal. */
const reach = 4;
/** The sign is replaced by a square wave that agrees with it up to so many standard deviations of y. */
const deviations = 5;
/** Harmonics damped below e^(−this) are left out. */
const damped = 13;

/**
 * Σ_k w(k)·E[a_k·sgn y] for the strobe y = Σ_j a_j g(−x − j) + n of one rail, off its place by x. With φ(u) = E cos au,
 * ψ(u) = E a sin au and the square wave's Fourier series (harmonics m odd, ω = π over the half period)
 *
 *     (4/π) Σ_m e^(−(mωσ)²/2)/m · Σ_k w(k) ψ(mω g_k) Π_(j≠k) φ(mω g_j)
 *
 * @see N. Beaulieu, "An infinite series for the computation of the complementary probability distribution function of
 *   a sum of independent random variables", IEEE Trans. Commun. 38 (1990), for the series
 */
export function signCorrelation({ rail, rollOff, variance, early, weight, weighted }: SignCorrelation): number {
  const power = railPower(rail);
  if (power === 0) return 0;
  const near = nearSymbols(early, rollOff, weight);
  const received = power * sampledCorrelation(early, 0, rollOff);
  const rest = Math.max(received - power * near.energy, 0);
  const omega = Math.PI / (deviations * Math.sqrt(received + variance));
  const decay = ((variance + rest) * omega ** 2) / 2;
  const far = power * (weighted - near.weighted);
  const wave = levelWaves(rail, near.taps, omega);
  let total = 0;
  for (let m = 1; m * m * decay < damped; m += 2) {
    total += (Math.exp(-m * m * decay) / m) * wave.next(near.weights, far * m * omega);
  }
  return (4 / Math.PI) * total;
}

function nearSymbols(early: number, rollOff: number, weight: (k: number) => number) {
  const count = 2 * reach + 1;
  const [taps, weights] = [new Float64Array(count), new Float64Array(count)];
  let [energy, weighted] = [0, 0];
  for (let i = 0; i < count; i += 1) {
    const k = i - reach;
    taps[i] = raisedCosine(-early - k, rollOff);
    weights[i] = weight(k);
    energy += taps[i]! ** 2;
    weighted += taps[i]! * weights[i]!;
  }
  return { taps, weights, energy, weighted };
}

/** cos and sin of mω·g_k·level for m = 1, 3, 5 …, each turned on from the one before. */
function levelWaves(rail: Rail, taps: Float64Array, omega: number) {
  const size = taps.length * rail.length;
  const [cos, sin, cosTurn, sinTurn] = [0, 1, 2, 3].map(() => new Float64Array(size)) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  taps.forEach((tap, k) => {
    rail.forEach(({ value }, v) => {
      const at = k * rail.length + v;
      const angle = omega * tap * value;
      cos[at] = Math.cos(angle);
      sin[at] = Math.sin(angle);
      cosTurn[at] = Math.cos(2 * angle);
      sinTurn[at] = Math.sin(2 * angle);
    });
  });
  const levels = Float64Array.from(rail, ({ value }) => value);
  const shares = Float64Array.from(rail, (level) => level.weight);

  return {
    /** Σ_k w(k)ψ_k Π_(j≠k) φ_j + far·Π φ_j at this harmonic; then on to the next. */
    next(weights: Float64Array, far: number): number {
      // Plain assignments: an array on each side would cost ten times as much here.
      let product = 1;
      let total = 0;
      for (let k = 0, at = 0; k < taps.length; k += 1) {
        let phi = 0;
        let psi = 0;
        for (let v = 0; v < levels.length; v += 1, at += 1) {
          const c = cos[at]!;
          const s = sin[at]!;
          phi += shares[v]! * c;
          psi += shares[v]! * levels[v]! * s;
          cos[at] = c * cosTurn[at]! - s * sinTurn[at]!;
          sin[at] = s * cosTurn[at]! + c * sinTurn[at]!;
        }
        total = total * phi + weights[k]! * psi * product;
        product *= phi;
      }
      return total + far * product;
    },
  };
}
