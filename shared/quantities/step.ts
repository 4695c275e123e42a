/**
 * Steps the last digit that was typed: 0.7071 becomes 0.7072, `±70 kHz` becomes `±71 kHz`. Text around the numeral stays.
 *
 * @param steps whole steps of that digit, negative for down
 * @returns the text unchanged when it holds no plain numeral
 */
export function stepLastDigit(text: string, steps: number): string {
  const match = /[-\u2212]?\d[\d\u202f\u2009 ]*(?:\.\d*)?/.exec(text);
  if (!match || match[0].includes(',')) return text;
  const typed = match[0].trimEnd();
  const plain = typed.replace(/\u2212/, '-').replace(/[\u202f\u2009 ]/g, '');
  const decimals = plain.split('.')[1]?.length ?? 0;
  const stepped = (Number(plain) + steps * 10 ** -decimals).toFixed(decimals);
  const shown = /^-0\.?0*$/.test(stepped) ? stepped.slice(1) : stepped.replace('-', '\u2212');
  return text.slice(0, match.index) + shown + text.slice(match.index + typed.length);
}
