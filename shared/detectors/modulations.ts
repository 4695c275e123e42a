import { constellation } from '../fixed-point/constellation';
import type { Point } from '../fixed-point/constellation';
import { ParameterError } from '../parameter-error';
import type { CompletePlan } from '../plan/complete';

export type Modulation = CompletePlan['signal']['modulation'];

/** Rotational symmetry M: the constellation looks the same after 1/M of a turn. */
export const rotationalSymmetry: Record<Modulation, number> = {
  BPSK: 2,
  OQPSK: 2,
  QPSK: 4,
  '16QAM': 4,
  '64QAM': 4,
  '16APSK': 4,
  '32APSK': 4,
  '8PSK': 8,
};

/**
 * Radii of the outer rings over the inner one where a plan names none: code rate 3/4 of ETSI EN 302 307-1, tables 9
 * and 10 (quoted from memory).
 */
export const usualRingRatios: Partial<Record<Modulation, readonly number[]>> = {
  '16APSK': [2.85],
  '32APSK': [2.84, 5.27],
};

/**
 * Ring ratios of an APSK constellation, the usual ones where none are given; empty for every other modulation.
 *
 * @throws {ParameterError} pointing at the ratios when there are too many or too few, or when they do not rise from 1
 */
export function ringRatiosOf(modulation: Modulation, given?: readonly number[]): readonly number[] {
  const usual = usualRingRatios[modulation];
  if (!usual) return [];
  if (!given) return usual;
  if (given.length !== usual.length) {
    const count = usual.length === 1 ? 'one ring ratio' : `${usual.length} ring ratios`;
    throw new ParameterError('/signal/ringRatios', `${modulation} takes ${count}, such as ${usual.join(' and ')}`);
  }
  if (given.some((ratio, i) => !(ratio > (given[i - 1] ?? 1)))) {
    throw new ParameterError(
      '/signal/ringRatios',
      'the ring ratios must rise from above 1: each ring is outside the last',
    );
  }
  return given;
}

/**
 * The points of a modulation, E|a|² = 1. OQPSK has those of QPSK, its quadrature half a symbol later.
 *
 * @throws {ParameterError} pointing at the ring ratios when they do not fit
 */
export function pointsOf(modulation: Modulation, ringRatios?: readonly number[]): Point[] {
  const shape = modulation === 'OQPSK' ? 'qpsk' : modulation.toLowerCase();
  return constellation(shape, ringRatiosOf(modulation, ringRatios));
}

/** The points of one M-th of the circle: turned by whole M-ths they make all of them. */
export function distinctPoints(modulation: Modulation, ringRatios?: readonly number[]): Point[] {
  const sector = (2 * Math.PI) / rotationalSymmetry[modulation];
  return pointsOf(modulation, ringRatios).filter(([i, q]) => {
    const angle = Math.atan2(q, i);
    return angle > -sector / 2 - 1e-9 && angle < sector / 2 - 1e-9;
  });
}

/** Largest |a| of a modulation with E|a|² = 1. */
export const largestMagnitude = (modulation: Modulation, ringRatios?: readonly number[]): number =>
  Math.max(...pointsOf(modulation, ringRatios).map(([i, q]) => Math.hypot(i, q)));
