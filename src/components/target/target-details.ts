import type { TargetBody } from '../../../shared/model/target';

export type Details = Omit<TargetBody, 'registerMap'>;

export const detailsOf = ({ slug, name, loopClockHz, cPrefix, baseAddress }: Details): Details => ({
  slug,
  name,
  loopClockHz,
  cPrefix,
  baseAddress,
});

const plain = (name: string): string => name.normalize('NFKD').replace(/\p{M}/gu, '');

/** Short name that follows a name: `Corvid C3` gives `corvid-c3`. */
export const slugFor = (name: string): string =>
  plain(name)
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^[-0-9]+|-+$/g, '')
    .slice(0, 40);

/** C prefix that follows a name: `Corvid C3` gives `CORVID_C3_`. */
export function prefixFor(name: string): string {
  const letters = plain(name)
    .toUpperCase()
    .replace(/[^A-Z0-9]+/g, '_')
    .replace(/^[_0-9]+|_+$/g, '');
  return letters === '' ? '' : `${letters.slice(0, 15).replace(/_+$/, '')}_`;
}

/** One sentence for each detail that cannot be saved, as the schema has them. */
export function detailFaults(details: Details, taken: readonly string[]): Partial<Record<keyof Details, string>> {
  const { name, slug, loopClockHz, cPrefix, baseAddress } = details;
  const faults: [keyof Details, boolean, string][] = [
    ['name', name.trim() === '' || name.length > 80, 'A target needs a name of at most 80 characters.'],
    ['slug', !/^[a-z][a-z0-9-]{0,39}$/.test(slug), 'Small letters, digits and hyphens, a letter first, at most 40.'],
    ['slug', taken.includes(slug), `Another target is called ${slug}.`],
    ['loopClockHz', !(loopClockHz > 0), 'Loop clock needs a value.'],
    [
      'cPrefix',
      cPrefix.length > 16 || !/^[A-Z][A-Z0-9]*(_[A-Z0-9]+)*_$/.test(cPrefix),
      'Capitals and digits, an underscore at the end, at most 16: CVD_.',
    ],
    ['baseAddress', !/^0x[0-9A-Fa-f]{1,16}$/.test(baseAddress), 'Hexadecimal: 0x40010000.'],
  ];
  return Object.fromEntries(faults.filter(([, wrong]) => wrong).map(([key, , sentence]) => [key, sentence]));
}
