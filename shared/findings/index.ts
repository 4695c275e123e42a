import type { Finding, LoopDesign } from '../model/design';
import type { CompletePlan } from '../plan/complete';
import { acquisitionFindings } from './acquisition';
import { bandwidthFindings } from './bandwidth';
import { clockFindings } from './clock';
import { headroomFindings } from './headroom';
import { loopViews } from './loop-view';
import type { LoopView } from './loop-view';
import { noiseFindings } from './noise';
import { quantisationFindings } from './quantisation';
import { resolutionFindings } from './resolution';
import { stabilityFindings } from './stability';

/** The families, in the order in which they are read. */
const families: readonly ((view: LoopView) => Finding[])[] = [
  stabilityFindings,
  acquisitionFindings,
  clockFindings,
  noiseFindings,
  bandwidthFindings,
  quantisationFindings,
  headroomFindings,
  resolutionFindings,
];

const rank = { fail: 0, caution: 1, pass: 2 } as const;

/** Every check of a plan, failing first, then caution, then pass. */
export function findingsOf(plan: CompletePlan, loops: { carrier?: LoopDesign; clock?: LoopDesign }): Finding[] {
  const found = loopViews(plan, loops).flatMap((view) => families.flatMap((family) => family(view)));
  return found.sort((a, b) => rank[a.severity] - rank[b.severity]);
}
