import { wrapText, cText } from './c-text';
import { decimalConstant, defineBlock } from './c-constant';
import { care, type FileInput } from './file-input';

/** Where a file comes from, as pairs of a label and a text. */
export function provenance(input: FileInput): [string, string][] {
  const { product, engine, planName, revision, release, target, digest } = input;
  return [
    ['Product', product],
    ['Engine', engine],
    ['Plan', planName],
    ['Revision', String(revision)],
    ['Release', release ?? 'none'],
    ['Target', `${target.name}, register map ${target.mapNumber}`],
    ['Digest', `sha256 ${digest}`],
  ];
}

/** Lines of a comment block, each made safe. */
export const comment = (lines: readonly string[]): string[] => [
  '/*',
  ...lines.map((line) => ` * ${line.startsWith(' ') ? '  ' : ''}${cText(line)}`.trimEnd()),
  ' */',
];

export const headComment = (input: FileInput): string[] =>
  comment([
    'config.h: what one plan writes into the registers of one receiver.',
    '',
    ...provenance(input).map(([label, text]) => `${label}: ${text}`),
    '',
    ...wrapText(care, 88),
  ]);

/** Guard that differs between headers of different digests: two of them in one file are a conflict, not a gap. */
export const guardName = ({ target, digest }: FileInput): string =>
  `${target.cPrefix}CONFIG_${digest
    .replace(/[^0-9a-f]/gi, '')
    .slice(0, 16)
    .toUpperCase()}_H`;

const quoted = (text: string): string => `"${cText(text)}"`;

/** Macros that name the header, for the program and for whoever reads the image. */
export function identity({ target, engine, planName, revision, release, digest }: FileInput): string[] {
  const named = (name: string, value: string) => ({ name: `${target.cPrefix}${name}`, value });
  return defineBlock([
    named('ENGINE', quoted(engine)),
    named('PLAN', quoted(planName)),
    named('REVISION', decimalConstant(BigInt(revision), false)),
    named('RELEASE', quoted(release ?? '')),
    named('MAP_VERSION', decimalConstant(BigInt(target.mapNumber), false)),
    named('DIGEST', quoted(digest)),
  ]);
}
