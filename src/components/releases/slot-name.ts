const most = 31;

/** What a slot may be called: it becomes part of file names and of C identifiers. */
export const slotPattern = /^[a-z][a-z0-9_]{0,30}$/;

/** A slot for a plan: its name in small letters and underscores, numbered when the set already has it. */
export function slotName(planName: string, taken: readonly string[]): string {
  const letters = planName
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '_')
    .replace(/^[_0-9]+|_+$/g, '');
  const stem = letters.slice(0, most).replace(/_+$/, '') || 'slot';
  for (let number = 1; ; number += 1) {
    const suffix = number === 1 ? '' : `_${number}`;
    const name = stem.slice(0, most - suffix.length) + suffix;
    if (!taken.includes(name)) return name;
  }
}
