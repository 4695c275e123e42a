import type { ClockWords } from '../../model/words';
import { sampleLsbLog2 } from '../tables';
import type { ExactSample } from './phase-detector';

/** Exact detector value of one symbol from the strobe y, the strobe before it, and the sample between them. */
export type TimingDetector = (y: ExactSample, before: ExactSample, between: ExactSample) => bigint;

/** The same on one rail. */
type Rail = (y: bigint, before: bigint, between: bigint) => bigint;

const sgn = (value: bigint): bigint => (value < 0n ? -1n : 1n);

const rails: Record<ClockWords['detector'], Rail> = {
  gardner: (y, before, between) => between * (before - y),
  'zero-crossing': (y, before, between) => between * (sgn(before) - sgn(y)),
  'mueller-muller': (y, before) => sgn(before) * y - sgn(y) * before,
};

/** log2 of one LSB of the detector value, in detector units. */
export const timingLsbLog2 = (words: ClockWords): number =>
  words.detector === 'gardner' ? 2 * sampleLsbLog2(words) : sampleLsbLog2(words);

/** The detector that the words ask for, both rails added. */
export function timingDetector({ detector }: ClockWords): TimingDetector {
  const rail = rails[detector];
  return (y, before, between) => rail(y[0], before[0], between[0]) + rail(y[1], before[1], between[1]);
}
