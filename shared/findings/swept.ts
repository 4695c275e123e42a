import type { JitterSweep } from '../model/design';
import { twoDigitsDown } from './finding';
import type { Remedy } from './finding';
import { askedOf } from './loop-view';
import type { StageView } from './loop-view';
import { nominalBandwidth, setBandwidth } from './narrower';

type SweptTerm = Exclude<keyof JitterSweep, 'noiseBandwidth'>;

/** The edit that narrows the last stage until one term of its jitter keeps a limit; null where no swept bandwidth does. */
export function narrowerWithin(at: StageView, term: SweptTerm, limit: number): Remedy | null {
  const nominal = nominalBandwidth(at);
  const widest = widestWithin(at, term, limit, nominal);
  return widest === null ? null : setBandwidth(at, twoDigitsDown((askedOf(at) * widest) / nominal));
}

/** Widest swept BnT below the present one whose term is within the limit, between two points by logarithms. */
function widestWithin({ design: { budget } }: StageView, term: SweptTerm, limit: number, below: number): number | null {
  if (!budget) return null;
  const { noiseBandwidth, [term]: values } = budget.sweep;
  const kept = (i: number): boolean => (values[i] ?? Infinity) <= limit;
  const last = noiseBandwidth.findLastIndex((bandwidth, i) => bandwidth < below && kept(i));
  if (last < 0) return null;
  const [from, to] = [noiseBandwidth[last] as number, noiseBandwidth[last + 1] ?? Infinity];
  const [low, high] = [values[last] as number, values[last + 1] ?? null];
  if (high === null || !(low > 0) || !(high > limit)) return from;
  return from * (to / from) ** (Math.log(limit / low) / Math.log(high / low));
}
