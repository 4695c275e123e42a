import type { Finding, LoopDesign } from '../model/design';
import type { CompletePlan } from '../plan/complete';

/** Every check of a plan, failing first, then caution, then pass. */
export function findingsOf(_plan: CompletePlan, _loops: { carrier?: LoopDesign; clock?: LoopDesign }): Finding[] {
  return [];
}
