import type { Finding } from '../model/design';
import type { Register, RegisterMap } from '../model/register-map';
import { hexText, rangeText, wordBitsOf } from './bits';
import type { PlacedField } from './field-checks';
import { fieldFindings, rangeFault } from './field-checks';
import { bySeverity, mapFinding } from './map-finding';
import { nameFindings } from './name-checks';
import { overlaps } from './overlap';
import { stageOf } from './quantities';

export { fieldRange, fieldWidth, fitsField, hexText, rangeText, resetWord, wordBitsOf } from './bits';

const placedFields = (register: Register, index: number): PlacedField[] =>
  register.fields.map((field, at) => ({ field, register, pointer: `/registers/${index}/fields/${at}` }));

function reservedFault(register: Register, index: number, wordBits: number): Finding[] {
  const reserved = register.reserved ?? 0;
  if (Number.isInteger(reserved) && reserved >= 0 && reserved < 2 ** wordBits) return [];
  return [
    mapFinding({
      slug: 'map.reserved',
      title: 'Its reserved bits do not fit',
      reason: `${register.name} has ${wordBits} bits; its reserved bits are given as ${reserved}.`,
      fields: [`/registers/${index}/reserved`],
    }),
  ];
}

function fieldsFindings(register: Register, index: number, wordBits: number): Finding[] {
  const fields = placedFields(register, index);
  const ranges = fields.map((field) => rangeFault(field, wordBits));
  const sound = fields.filter((_, at) => ranges[at]?.length === 0);
  return [...ranges.flat(), ...overlaps(sound), ...sound.flatMap(fieldFindings)];
}

const offsetFinding = (title: string, reason: string, index: number): Finding =>
  mapFinding({ slug: 'map.offset', title, reason, fields: [`/registers/${index}/offset`] });

function offsetFaults({ registers }: RegisterMap, wordBits: number): Finding[] {
  const bytes = wordBits / 8;
  return registers.flatMap(({ name, offset }, index) => {
    const first = registers.findIndex((other) => other.offset === offset);
    const at = `${name} is at offset ${hexText(Math.max(0, offset || 0), 16)}`;
    if (!Number.isInteger(offset) || offset < 0 || offset % bytes !== 0) {
      return [
        offsetFinding(
          'Its offset is not aligned',
          `${at}; a register of ${wordBits} bits takes ${bytes} bytes.`,
          index,
        ),
      ];
    }
    if (first === index) return [];
    return [
      offsetFinding('Two registers share an offset', `${at}, where ${registers[first]?.name} is already.`, index),
    ];
  });
}

/** Every address of the registers within 64 bits, and the base on a register's boundary. */
function addressFaults({ registers }: RegisterMap, wordBits: number, baseAddress: string | undefined): Finding[] {
  if (baseAddress === undefined || !/^0x[0-9a-f]{1,16}$/i.test(baseAddress)) return [];
  const base = BigInt(baseAddress);
  const bytes = wordBits / 8;
  const last = BigInt(Math.max(0, ...registers.map(({ offset }) => Math.floor(offset) || 0)));
  const within = base + last + BigInt(bytes) <= 1n << 64n;
  if (registers.length === 0 || (within && base % BigInt(bytes) === 0n)) return [];
  return [
    mapFinding({
      slug: 'map.address',
      title: within ? 'The base address is not aligned' : 'The addresses end beyond 64 bits',
      reason: `The base address is ${baseAddress}; a register of ${wordBits} bits takes ${bytes} bytes.`,
      fields: [''],
    }),
  ];
}

const gainNames = ['proportional.mantissa', 'proportional.shift', 'integral.mantissa', 'integral.shift'];

/** Gain words that a stage lacks although the map holds others of the same stage. */
function missingGains({ registers }: RegisterMap): string[] {
  const bound = new Set(registers.flatMap(({ fields }) => fields.flatMap(({ quantity }) => quantity ?? [])));
  const stages = new Set([...bound].flatMap((path) => (stageOf(path) ? [path.split('.').slice(0, 2).join('.')] : [])));
  return [...stages].flatMap((stage) => gainNames.map((name) => `${stage}.${name}`)).filter((path) => !bound.has(path));
}

function unboundFindings(map: RegisterMap): Finding[] {
  const missing = missingGains(map);
  if (missing.length === 0) return [];
  const more = missing.length > 1 ? ` and ${missing.length - 1} more` : '';
  return [
    mapFinding({
      slug: 'map.unbound',
      severity: 'caution',
      title: missing.length === 1 ? 'A gain word has no field' : `${missing.length} gain words have no field`,
      reason: `No field holds ${missing[0]}${more}; the write table leaves ${more ? 'them' : 'it'} out.`,
      fields: ['/registers'],
    }),
  ];
}

/**
 * What is wrong with a register map by itself, whatever plan is written through it: failing findings first.
 * `fields` and `change.pointer` are JSON pointers into the map. A map with a failing finding makes no header.
 *
 * @param baseAddress hexadecimal; checked with the offsets where it is given
 */
export function mapFindings(map: RegisterMap, baseAddress?: string): Finding[] {
  const wordBits = wordBitsOf(map);
  return bySeverity([
    ...nameFindings(map),
    ...offsetFaults(map, wordBits),
    ...addressFaults(map, wordBits, baseAddress),
    ...map.registers.flatMap((register, index) => [
      ...reservedFault(register, index, wordBits),
      ...fieldsFindings(register, index, wordBits),
    ]),
    ...unboundFindings(map),
  ]);
}

/** Bits of a register that its fields claim. */
export const usedBits = ({ fields }: Register): number =>
  new Set(fields.flatMap(({ high, low }) => Array.from({ length: Math.max(0, high - low + 1) }, (_, bit) => low + bit)))
    .size;

/** A field by its full name, `CAR_LIMIT.limit [31:0]`. */
export const fieldText = (register: Register, field: Register['fields'][number]): string =>
  `${register.name}.${field.name} ${rangeText(field)}`;
