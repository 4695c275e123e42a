import { logarithmicCrossings } from '../math/crossing';
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

/** Widest BnT below the present one whose term is within the limit; that of a swept point where the curve has no crossing. */
function widestWithin({ design: { budget } }: StageView, term: SweptTerm, limit: number, below: number): number | null {
  if (!budget) return null;
  const { noiseBandwidth, [term]: values } = budget.sweep;
  const last = noiseBandwidth.findLastIndex((x, i) => x < below && (values[i] ?? Infinity) <= limit);
  if (last < 0) return null;
  const from = noiseBandwidth[last] as number;
  return logarithmicCrossings(noiseBandwidth, values, limit).find(({ x, rising }) => rising && x >= from)?.x ?? from;
}
