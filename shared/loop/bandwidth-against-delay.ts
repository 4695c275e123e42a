import type { BandwidthAgainstDelay } from '../model/design';
import type { LinearLoop } from './linear-loop';
import { noiseBandwidth } from './noise-bandwidth';
import { swiftNoiseBandwidth } from './swift-noise-bandwidth';

/** The longest delay that a plan can ask for, updates. */
const longestDelay = 64;
const mostPoints = 17;

/**
 * Noise bandwidth of a stage's gains over the extra delay: from none to the longest that leaves the loop stable, 17
 * delays at most, its own among them, and one beyond that is null.
 *
 * @param largestDelay largest delay that leaves the loop stable; null where none does
 * @param updateInterval symbols per update: the bandwidth is per symbol
 */
export function bandwidthAgainstDelay(
  loop: LinearLoop,
  largestDelay: number | null,
  updateInterval: number,
): BandwidthAgainstDelay {
  const last = Math.min(largestDelay ?? -1, longestDelay);
  const delay = delaysTo(last, loop.delay);
  const bandwidth = (d: number): number | null => {
    const found =
      d > last ? null : d === loop.delay ? noiseBandwidth(loop) : swiftNoiseBandwidth({ ...loop, delay: d });
    return found === null ? null : found / updateInterval;
  };
  return { delay, noiseBandwidth: delay.map(bandwidth) };
}

function delaysTo(last: number, own: number): number[] {
  const points = Math.min(mostPoints, last + 1);
  const spread = Array.from({ length: points }, (_, i) => (points < 2 ? 0 : Math.round((i * last) / (points - 1))));
  const beyond = Math.min(Math.max(last + 1, 0), longestDelay);
  return [...new Set([...spread, own, beyond])].sort((a, b) => a - b);
}
