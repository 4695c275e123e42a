import { fieldNumber } from '../../../shared/plan/fields';
import { worksOut, type DraftSession } from '../../composables/use-draft';
import type { SheetState } from './sheet-verdict';

/** Why a new plan cannot be stored yet; undefined when it can. */
export function createReason({ plan, locked }: Pick<DraftSession, 'plan' | 'locked'>, { wrong }: SheetState) {
  const { name, target, signal, carrier, clock } = plan.value;
  if (locked.value) return locked.value;
  if (!name) return 'needs a name';
  if (!target) return 'needs a target';
  if (signal?.symbolRateBd === undefined) return 'needs 1.2, the symbol rate';
  if (!carrier && !clock) return 'needs a loop';
  return wrong[0] === undefined ? undefined : `${fieldNumber(wrong[0])} must be mended first`;
}

/** Why no revision can be saved now; undefined when one can. */
export function saveReason(draft: DraftSession, { wrong, freshness }: SheetState, diverged: boolean) {
  if (diverged) return 'choose below first';
  if (wrong[0] !== undefined) return `${fieldNumber(wrong[0])} must be mended first`;
  if (!worksOut(draft.plan.value)) return 'needs a symbol rate and a loop';
  if (freshness === 'failed') return 'the server gives no answer';
  const saved = draft.baseName.value;
  return saved !== undefined && draft.changes.value.length === 0 ? `no edits since ${saved}` : undefined;
}
