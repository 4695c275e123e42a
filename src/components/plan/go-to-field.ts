import { nextTick } from 'vue';

/** Brings a field of the form into view and the focus into it, opening its fold; false when the form does not show it. */
export async function goToField(pointer: string): Promise<boolean> {
  const place = placeOf(pointer);
  if (!place) return false;
  for (const fold of foldsAround(place)) fold.open = true;
  await nextTick();
  const control = place.matches(controls) ? place : place.querySelector<HTMLElement>(controls);
  place.scrollIntoView({ block: 'center' });
  (control ?? place).focus({ preventScroll: true });
  return true;
}

const controls = 'input, select, textarea, button';

/** The field itself, or the nearest thing above it that the form shows: one offset of a mask is shown by its table. */
function placeOf(pointer: string): HTMLElement | null {
  for (let at = pointer; at !== ''; at = at.slice(0, at.lastIndexOf('/'))) {
    const place = document.querySelector<HTMLElement>(`[data-pointer="${CSS.escape(at)}"]`);
    if (place) return place;
  }
  return null;
}

function foldsAround(place: HTMLElement): HTMLDetailsElement[] {
  const folds: HTMLDetailsElement[] = [];
  for (let fold = place.closest('details'); fold; fold = fold.parentElement?.closest('details') ?? null)
    folds.push(fold);
  return folds;
}

/** Brings the first finding into view; the list begins with what fails. */
export function goToFirstFinding(): void {
  const title = document.querySelector<HTMLElement>('.fd h3');
  title?.scrollIntoView({ block: 'center' });
  title?.focus({ preventScroll: true });
}
