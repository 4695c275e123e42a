import type { SCurveShape } from '../detectors/detector';

/** A loop of order 2 at its update rate. */
export interface LoopDynamics {
  damping: number;
  /** Natural frequency ωn, rad/s. */
  omegaN: number;
}

/**
 * Largest carrier offset that cannot be mistaken for another: half the spacing 1/(M·T) of the false-lock offsets, and
 * no more than the first zero of an average over U symbols, Hz.
 */
export function unambiguousOffsetHz({
  symmetry,
  symbolRateBd,
  averaged,
}: {
  symmetry: number;
  symbolRateBd: number;
  averaged: number;
}): number {
  return symbolRateBd / (symmetry * Math.max(2, averaged));
}

/** Spacing of the offsets at which the error is stationary again although the loop is not locked: 1/(M·T), Hz. */
export const falseLockSpacingHz = (symmetry: number, symbolRateBd: number): number => symbolRateBd / symmetry;

/**
 * Estimate of the offset from which the loop locks without slipping a cycle: Δω ≈ 2ζωn · max s, rad/s, with s the
 * S-curve over its slope.
 *
 * @see F. Gardner, "Phaselock Techniques", 3rd ed. 2005
 */
export const lockInOmega = ({ damping, omegaN }: LoopDynamics, { largest }: SCurveShape): number =>
  2 * damping * omegaN * largest;
