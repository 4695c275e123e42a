import { useKeys } from './use-keys';

const headings = 'main .sec h2, main .fold > summary, main h2[id]';

/** `[` and `]` go to the section before and after, `f` to the first finding. */
export function useSectionKeys(): void {
  useKeys({
    '[': () => step(-1),
    ']': () => step(1),
    f: () => reach(document.querySelector<HTMLElement>('main .fd h3')),
  });
}

function step(by: 1 | -1) {
  const all = [...document.querySelectorAll<HTMLElement>(headings)].filter((heading) => heading.offsetParent !== null);
  const here = all.findIndex((heading) => heading.contains(document.activeElement));
  const from = here >= 0 ? here : all.findLastIndex((heading) => heading.getBoundingClientRect().top < 80);
  reach(all[Math.min(all.length - 1, Math.max(0, from + by))] ?? null);
}

function reach(place: HTMLElement | null) {
  place?.scrollIntoView({ block: 'start' });
  place?.focus({ preventScroll: true });
}
