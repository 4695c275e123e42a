/** Moves focus to the next or previous section of the sheet, from the one that is at the top of the window now. */
export function stepThroughSections(sheet: HTMLElement | null, step: 1 | -1): void {
  const heads = [...(sheet?.querySelectorAll<HTMLElement>('.sec h2, .fold > summary') ?? [])];
  const margin = 80;
  const focused = heads.findIndex((head) => head === document.activeElement);
  const above = heads.findLastIndex((head) => head.getBoundingClientRect().top <= margin);
  const at = focused >= 0 ? focused : above;
  const next = heads[at + step];
  next?.scrollIntoView({ block: 'start' });
  next?.focus({ preventScroll: true });
}
