let pressed = false;

for (const type of ['pointerdown', 'pointerup', 'pointercancel']) {
  document.addEventListener(type, () => (pressed = type === 'pointerdown'), true);
}

/**
 * Runs `work` at once or, while a pointer is down, after the click that it makes. A line that comes or goes when a field
 * is left would otherwise move the pressed button away from under the pointer, and its click would be lost.
 */
export function afterPress(work: () => void): void {
  if (!pressed) return work();
  const ends = ['pointerup', 'pointercancel'];
  const end = () => {
    ends.forEach((type) => document.removeEventListener(type, end));
    setTimeout(work);
  };
  ends.forEach((type) => document.addEventListener(type, end));
}
