import type { DraftSession } from '../../composables/use-draft';

/** State of a sheet for its title block: “draft on r14, 2 edits”, “r14”, “new, not stored”. */
export function sheetStateText(
  { changes, baseName, typed, locked }: Pick<DraftSession, 'changes' | 'baseName' | 'typed' | 'locked'>,
  { stored, kept }: { stored: boolean; kept: boolean },
): string {
  if (!stored) return 'new, not stored';
  const edits = changes.value.length + Object.keys(typed.value).length;
  const base = baseName.value;
  const text = base === undefined ? 'draft, no revision yet' : edits === 0 ? base : `draft on ${base}, ${count(edits)}`;
  return kept || locked.value !== undefined ? text : `${text}, not kept yet`;
}

const count = (edits: number): string => (edits === 1 ? '1 edit' : `${edits} edits`);
