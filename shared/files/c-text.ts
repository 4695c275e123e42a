/** Names of characters that do not come apart into an ASCII letter and its marks. */
const names: Record<string, string> = {
  α: 'alpha',
  β: 'beta',
  γ: 'gamma',
  Δ: 'Delta',
  δ: 'delta',
  ζ: 'zeta',
  η: 'eta',
  θ: 'theta',
  λ: 'lambda',
  μ: 'u',
  ν: 'nu',
  π: 'pi',
  σ: 'sigma',
  τ: 'tau',
  φ: 'phi',
  ω: 'omega',
  '−': '-',
  '–': '-',
  '—': '-',
  '·': '*',
  '×': 'x',
  '±': '+/-',
  '°': ' deg',
  '⁄': '/',
  '“': "'",
  '”': "'",
  '‘': "'",
  '’': "'",
  ß: 'ss',
  Æ: 'AE',
  æ: 'ae',
  Ø: 'O',
  ø: 'o',
  Œ: 'OE',
  œ: 'oe',
  Ł: 'L',
  ł: 'l',
  Đ: 'D',
  đ: 'd',
  ı: 'i',
  Þ: 'Th',
  þ: 'th',
  ð: 'd',
};

/** Printable ASCII for any text; a character with no counterpart becomes an underscore, a control a space. */
function asciiText(text: string): string {
  const named = [...text].map((character) => names[character] ?? character).join('');
  const plain = named.normalize('NFKD').replace(/\p{M}/gu, '');
  return [...plain]
    .map((character) => names[character] ?? character)
    .join('')
    .replace(/\p{C}|\p{Z}/gu, ' ')
    .replace(/[^\x20-\x7e]/gu, '_')
    .replace(/ {2,}/g, ' ')
    .trim();
}

/**
 * Text that stands in a C comment or a C string as it is: ASCII, no quote, no backslash, nothing that opens or
 * closes a comment, no trigraph.
 */
export const cText = (text: string): string =>
  asciiText(text)
    .replaceAll('\\', '/')
    .replaceAll('"', "'")
    .replace(/\*(?=\/)|\/(?=\*)/g, '$& ')
    .replace(/\?(?=\?)/g, '? ');

/** Lines of at most `width` characters, broken at spaces. */
export function wrapText(text: string, width: number): string[] {
  return text.split(' ').reduce<string[]>((lines, word) => {
    const last = lines.at(-1);
    if (last === undefined || last.length + 1 + word.length > width) return [...lines, word];
    return [...lines.slice(0, -1), `${last} ${word}`];
  }, []);
}
