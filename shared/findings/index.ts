import type { Finding, LoopDesign, LoopInteraction } from '../model/design';
import type { CompletePlan } from '../plan/complete';
import { acquisitionFindings } from './acquisition';
import { acquisitionTimeFindings } from './acquisition-time';
import { amplitudeFindings } from './amplitude';
import { bandwidthFindings } from './bandwidth';
import { clockFindings } from './clock';
import { dynamicsFindings } from './dynamics';
import { headroomFindings } from './headroom';
import { interactionFindings } from './interaction';
import { lockDetectorFindings } from './lock-detector';
import { loopViews } from './loop-view';
import type { LoopView } from './loop-view';
import { noiseFindings } from './noise';
import { quantisationFindings } from './quantisation';
import { resolutionFindings } from './resolution';
import { stabilityFindings } from './stability';

/** The families, in the order in which they are read. */
const families: readonly ((view: LoopView) => Finding[])[] = [
  stabilityFindings,
  amplitudeFindings,
  acquisitionFindings,
  acquisitionTimeFindings,
  lockDetectorFindings,
  clockFindings,
  noiseFindings,
  dynamicsFindings,
  bandwidthFindings,
  quantisationFindings,
  headroomFindings,
  resolutionFindings,
];

const rank = { fail: 0, caution: 1, pass: 2 } as const;

/** What a plan's checks look at. */
export interface JudgedLoops {
  carrier?: LoopDesign;
  clock?: LoopDesign;
  /** Null where there is one loop alone. */
  interaction: LoopInteraction | null;
}

/** Every check of a plan, failing first, then caution, then pass. */
export function findingsOf(plan: CompletePlan, { interaction, ...loops }: JudgedLoops): Finding[] {
  const ofLoops = loopViews(plan, loops).flatMap((view) => families.flatMap((family) => family(view)));
  const found = [...ofLoops, ...interactionFindings(plan, loops, interaction)];
  return found.sort((a, b) => rank[a.severity] - rank[b.severity]);
}
