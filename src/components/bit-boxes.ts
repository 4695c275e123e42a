/** Class of one box: sign, reached, free (no class), guard, overflow. */
export type Box = 'sg' | 'us' | '' | 'gd' | 'ov';

/** The boxes of a word from its sign to its lowest bit. */
export function boxesOf(word: {
  bits: number;
  reached: number;
  guard?: number | undefined;
  overflow?: boolean | undefined;
}): Box[] {
  const guard = Math.min(word.guard ?? 0, word.bits - 1);
  const whole = word.bits - 1 - guard;
  const reached = Math.max(0, Math.min(whole, Math.ceil(word.reached - guard)));
  const used: Box = word.overflow ? 'ov' : 'us';
  return [
    word.overflow ? 'ov' : 'sg',
    ...Array<Box>(whole - reached).fill(''),
    ...Array<Box>(reached).fill(used),
    ...Array<Box>(guard).fill('gd'),
  ];
}
