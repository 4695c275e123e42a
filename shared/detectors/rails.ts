import erf from '@stdlib/math-base-special-erf';
import { pointsOf } from './modulations';
import type { Modulation } from './modulations';

/** One magnitude that a rail of a point takes, either sign alike. */
export interface RailLevel {
  /** |a|, 0 or above, unit amplitude. */
  value: number;
  /** Its probability. */
  weight: number;
}

/** One rail of a random point. */
export type Rail = readonly RailLevel[];

/** What the timing detectors ask of a constellation whose rails are each their own mirror image. */
export interface Rails {
  inPhase: Rail;
  quadrature: Rail;
  /** Magnitudes of both rails of a point together. */
  joint: readonly { inPhase: number; quadrature: number; weight: number }[];
}

/** Moments of one rail of a strobe y = a + n at lock, unit amplitude. */
export interface RailMoments {
  /** E a². */
  power: number;
  /** E a⁴ − 3(E a²)². */
  excess: number;
  /** E y². */
  received: number;
  /** E |y|. */
  magnitude: number;
  /** E a·sgn y. */
  decided: number;
  /** Twice the density of y at 0, averaged: how fast the mean of sgn y follows an offset. 0 without noise. */
  turning: number;
}

/** The rails of a modulation, E|a|² = 1 on both together. */
export function railsOf(modulation: Modulation, ringRatios?: readonly number[]): Rails {
  const points = pointsOf(modulation, ringRatios);
  const weight = 1 / points.length;
  return {
    inPhase: merged(points.map(([i]) => Math.abs(i))),
    quadrature: merged(points.map(([, q]) => Math.abs(q))),
    joint: points.map(([i, q]) => ({ inPhase: Math.abs(i), quadrature: Math.abs(q), weight })),
  };
}

/** Levels that rounding alone tells apart are one. */
function merged(magnitudes: readonly number[]): Rail {
  const levels: RailLevel[] = [];
  for (const magnitude of magnitudes) {
    const known = levels.find(({ value }) => Math.abs(value - magnitude) < 1e-9);
    if (known) known.weight += 1 / magnitudes.length;
    else levels.push({ value: magnitude < 1e-9 ? 0 : magnitude, weight: 1 / magnitudes.length });
  }
  return levels;
}

const mean = (rail: Rail, of: (value: number) => number): number =>
  rail.reduce((sum, { value, weight }) => sum + weight * of(value), 0);

/** E a² of a rail. */
export const railPower = (rail: Rail): number => mean(rail, (a) => a * a);

/**
 * @param variance noise of one rail, 0 or above
 */
export function railMoments(rail: Rail, variance: number): RailMoments {
  const power = railPower(rail);
  const deviation = Math.sqrt(variance);
  const decided = mean(rail, (a) => (variance === 0 ? a : a * erf(a / (deviation * Math.SQRT2))));
  const turning = variance === 0 ? 0 : mean(rail, (a) => (2 * normalDensity(a / deviation)) / deviation);
  return {
    power,
    excess: mean(rail, (a) => a ** 4) - 3 * power ** 2,
    received: power + variance,
    magnitude: decided + variance * turning,
    decided,
    turning,
  };
}

/** Covariance of |y| on one rail and |y| on the other; 0 where the rails of a point are independent. */
export function magnitudeCovariance({ joint }: Rails, variance: number): number {
  const magnitude = (a: number): number => railMoments([{ value: a, weight: 1 }], variance).magnitude;
  return covarianceOf(joint, magnitude);
}

/** Covariance of a² on one rail and a² on the other. */
export const powerCovariance = ({ joint }: Rails): number => covarianceOf(joint, (a) => a * a);

function covarianceOf(joint: Rails['joint'], of: (value: number) => number): number {
  let [product, first, second] = [0, 0, 0];
  for (const { inPhase, quadrature, weight } of joint) {
    const [i, q] = [of(inPhase), of(quadrature)];
    product += weight * i * q;
    first += weight * i;
    second += weight * q;
  }
  return product - first * second;
}

const normalDensity = (x: number): number => Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);
