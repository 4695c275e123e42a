import { raisedCosine, sampledCorrelation, sharedRollOff } from './pulse';
import { magnitudeCovariance, powerCovariance, railMoments } from './rails';
import type { Rails, RailMoments } from './rails';

/** The signal at a timing detector, unit amplitude. */
export interface TimingSignal {
  rails: Rails;
  rollOff: number;
  /** Noise of one rail, 0 or above; coloured by the matched filter, its autocorrelation goes with the pulse. */
  variance: number;
}

/** Autocovariance of a timing error at lock over a lag of so many symbols. */
type Covariance = (lag: number) => number;

/*
 * At lock the strobes y_k = a_k + n_k are independent of one another: the pulse vanishes at whole symbols, and so does
 * the noise's autocorrelation. The sample half-way is m_k = Σ_j g(k − ½ − j) y_j + r_k, r_k being the part of its noise
 * that no strobe shares. So every error is a form in independent strobes and r, and its covariance has a closed form.
 */

/** g(i + ½). */
const halfWay = (i: number, rollOff: number): number => raisedCosine(i + 0.5, rollOff);

/** Σ (y′ − y)_0 (y′ − y)_l over the strobes that both differences hold: 2, −1, 0. */
const sharedStrobes = (lag: number): number => (lag === 0 ? 2 : lag === 1 ? -1 : 0);

/** Autocovariance of r: the noise's less what the strobes explain of it, 4·(−1)^l·∫ G(f + ½)·G(f − ½)·cos 2πfl df. */
const unexplained = (lag: number, { rollOff, variance }: TimingSignal): number =>
  variance * 4 * (lag % 2 === 0 ? 1 : -1) * sharedRollOff(lag, rollOff);

const bothRails = ({ rails, variance }: TimingSignal): RailMoments[] => [
  railMoments(rails.inPhase, variance),
  railMoments(rails.quadrature, variance),
];

/** Re m*(y′ − y): a quadratic form in strobes, whose covariance takes their second and fourth moments. */
function gardner(signal: TimingSignal): Covariance {
  const { rollOff } = signal;
  const rails = bothRails(signal);
  const between = 2 * powerCovariance(signal.rails);
  const peak = halfWay(0, rollOff) ** 2;
  return (lag) => {
    const shared = sharedStrobes(lag);
    const correlation = sampledCorrelation(0.5, lag, rollOff);
    const crossed = (halfWay(lag, rollOff) - halfWay(lag - 1, rollOff)) ** 2;
    const rest = unexplained(lag, signal);
    const ofRail = ({ received, excess }: RailMoments): number =>
      received ** 2 * (correlation * shared - crossed) + excess * peak * shared + rest * received * shared;
    return sum(rails, ofRail) + between * peak * shared;
  };
}

/** Re m*(ŝ′ − ŝ), ŝ the signs of the rails. */
function zeroCrossing(signal: TimingSignal): Covariance {
  const { rollOff } = signal;
  const rails = bothRails(signal);
  const between = 2 * magnitudeCovariance(signal.rails, signal.variance) * halfWay(0, rollOff) ** 2;
  return (lag) => {
    const correlation = sampledCorrelation(0.5, lag, rollOff);
    const crossed = signPairs(lag, rollOff);
    const shared = sharedStrobes(lag);
    const rest = unexplained(lag, signal) * shared;
    const ofRail = ({ received, magnitude }: RailMoments): number =>
      received * correlation * shared + magnitude ** 2 * crossed + rest;
    return sum(rails, ofRail) + between * shared;
  };
}

/** Σ ± h_0(a)h_l(b) + h_0(b)h_l(a) over the pairs of unlike strobes a of the first difference, b of the other. */
function signPairs(lag: number, rollOff: number): number {
  const weight = (at: number, strobe: number): number => halfWay(at - 1 - strobe, rollOff);
  let total = 0;
  for (const a of [-1, 0]) {
    for (const b of [lag - 1, lag]) {
      const sign = (a === -1) === (b === lag - 1) ? 1 : -1;
      if (a !== b) total += sign * (weight(0, a) * weight(lag, b) + weight(0, b) * weight(lag, a));
    }
  }
  return total;
}

/** ŝ′y − ŝy′: every product of two of them at unlike times has a strobe of its own, so errors are uncorrelated. */
function muellerMuller(signal: TimingSignal): Covariance {
  const variance = sum(bothRails(signal), ({ received, magnitude }) => 2 * (received - magnitude ** 2));
  return (lag) => (lag === 0 ? variance : 0);
}

/** Distance of the early and late interpolants from the strobe, symbols. */
export const earlyLateOffset = 0.25;

/** Symbols on either side whose share of a sum over all symbols is added up. */
const reach = 32;

/** |y(+δ)|² − |y(−δ)|²: twice the squared covariances of the interpolants, and what the fourth moment adds. */
function earlyLate(signal: TimingSignal): Covariance {
  const { rollOff, variance } = signal;
  const rails = bothRails(signal);
  const between = 2 * powerCovariance(signal.rails);
  const width = 2 * earlyLateOffset;
  const shares = Array.from({ length: 2 * reach + 1 }, (_, i) => difference(i - reach, rollOff));
  return (lag) => {
    const pair = (t: number, apart: number) => ({
      correlation: sampledCorrelation(t, apart, rollOff),
      noise: variance * raisedCosine(apart, rollOff),
    });
    const like = [pair(earlyLateOffset, lag), pair(-earlyLateOffset, lag)];
    const unlike = [pair(earlyLateOffset, lag - width), pair(-earlyLateOffset, lag + width)];
    const shared = shares.reduce((total, share, i) => total + share * (shares[i - lag] ?? 0), 0);
    return (
      sum(rails, ({ power, excess }) => {
        const squares = (pairs: typeof like) => sum(pairs, (each) => (power * each.correlation + each.noise) ** 2);
        return 2 * (squares(like) - squares(unlike)) + excess * shared;
      }) +
      between * shared
    );
  };
}

/** g²(j − δ) − g²(j + δ). */
const difference = (j: number, rollOff: number): number =>
  raisedCosine(j - earlyLateOffset, rollOff) ** 2 - raisedCosine(j + earlyLateOffset, rollOff) ** 2;

const sum = <T>(values: readonly T[], of: (value: T) => number): number =>
  values.reduce((total, value) => total + of(value), 0);

const makers = { gardner, 'zero-crossing': zeroCrossing, 'mueller-muller': muellerMuller, 'early-late': earlyLate };

/** Errors so far apart that their covariance over the variance is below this count as uncorrelated. */
const negligible = 1e-9;
/** Longest lag; a pulse of roll-off α dies down over some 1/α symbols. */
const longestLag = (rollOff: number): number => Math.min(256, Math.ceil(16 + 8 / rollOff));

/**
 * Autocovariance of the errors of a timing detector at lock, unit amplitude, both rails added, lags of 0, 1, 2 …
 * symbols until it has died down; empty where the error is always 0.
 */
export function timingCovariance(detector: keyof typeof makers, signal: TimingSignal): number[] {
  const covariance = makers[detector](signal);
  const variance = covariance(0);
  if (variance < negligible ** 1.5) return [];
  const values = Array.from({ length: longestLag(signal.rollOff) + 1 }, (_, lag) => covariance(lag));
  const last = values.findLastIndex((value) => Math.abs(value) > negligible * variance);
  return values.slice(0, last + 1);
}
