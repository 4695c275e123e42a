const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const two = (value: number): string => String(value).padStart(2, '0');

/** `27 Nov 2026`, in the person's own time zone. */
export function dateText(iso: string): string {
  const date = new Date(iso);
  return `${date.getDate()} ${months[date.getMonth()]} ${date.getFullYear()}`;
}

/** `29 Nov, 09:14`, in the person's own time zone. */
export function timeText(iso: string): string {
  const date = new Date(iso);
  return `${date.getDate()} ${months[date.getMonth()]}, ${two(date.getHours())}:${two(date.getMinutes())}`;
}

/** `2026-11-29 09:14:02 UTC`, for audit and evidence. */
export const utcText = (iso: string): string => `${new Date(iso).toISOString().slice(0, 19).replace('T', ' ')} UTC`;

/** The first digits of a digest in fours, as people read them out: `9f3a 51c7 e2d8`. */
export const digestText = (hex: string): string => (hex.slice(0, 12).match(/.{4}/g) ?? []).join(' ');
