import type { RegisterValue } from '../registers/binding';
import { fieldName, registerName } from '../registers/c-names';
import { decimalConstant, hexConstant } from './c-constant';
import type { FileInput } from './file-input';
import { fieldMask } from '../registers/bits';
import { writtenRegisters } from './header-registers';

/** Type and array of the writes; an array of no elements is not C, so an empty map has a count only. */
export function writeTable({ target }: FileInput, values: readonly RegisterValue[]): string[] {
  const { cPrefix } = target;
  const lower = cPrefix.toLowerCase();
  const rows = writtenRegisters(values).map(
    ({ register }) =>
      `    { ${cPrefix}${registerName(register, 'OFFSET')}, ${cPrefix}${registerName(register, 'VALUE')} }`,
  );
  const count = `#define ${cPrefix}WRITE_COUNT ${decimalConstant(BigInt(rows.length), false)}`;
  if (rows.length === 0) return [count, ''];
  return [
    '/* The writes in their order; offsets count bytes from the base address. */',
    count,
    '',
    `struct ${lower}write {`,
    '    uint32_t offset;',
    '    uint32_t value;',
    '};',
    '',
    `static const struct ${lower}write ${lower}write_table[${cPrefix}WRITE_COUNT] = {`,
    rows.join(',\n'),
    '};',
    '',
  ];
}

/** The sum of a register's fields and its reserved bits, as C. */
function sumOfFields(cPrefix: string, { register, fields }: RegisterValue): string {
  const claimed = fields.reduce((mask, { field }) => mask + fieldMask(field), 0);
  const reserved = BigInt(register.reserved ?? 0) & ~BigInt(claimed);
  const parts = fields.map(({ field }) => {
    const at = (macro: 'VALUE' | 'SHIFT') => cPrefix + fieldName(register, field, macro);
    return `(${at('VALUE')} << ${at('SHIFT')})`;
  });
  return [...(reserved === 0n && parts.length > 0 ? [] : [hexConstant(reserved)]), ...parts].join(' | ');
}

function registerAssertions(cPrefix: string, entry: RegisterValue): string[] {
  const { register, fields } = entry;
  const value = cPrefix + registerName(register, 'VALUE');
  return [
    ...fields.map(({ field }) => `${cPrefix}ASSERT_FIELD(${cPrefix}${fieldName(register, field)});`),
    `${cPrefix}ASSERT(${value} == (${sumOfFields(cPrefix, entry)}), "${register.name}");`,
  ];
}

/** The value of a field within its mask, the mask as wide as the field: no shift by 32 at a width of 32. */
const fieldAssertion = (cPrefix: string): string[] => [
  `#define ${cPrefix}ONES(field) (UINT32_C(0xFFFFFFFF) >> (UINT32_C(32) - field##_WIDTH))`,
  `#define ${cPrefix}ASSERT_FIELD(field) \\`,
  `    ${cPrefix}ASSERT(field##_MASK == ${cPrefix}ONES(field) << field##_SHIFT && \\`,
  `        (field##_VALUE & ~${cPrefix}ONES(field)) == 0u, #field)`,
];

/** Assertions for the languages that have them; elsewhere the header has none. */
export function assertions({ target }: FileInput, values: readonly RegisterValue[]): string[] {
  const { cPrefix } = target;
  const lines = writtenRegisters(values).flatMap((entry) => registerAssertions(cPrefix, entry));
  if (lines.length === 0) return [];
  return [
    '#if defined(__cplusplus) && __cplusplus >= 201103L',
    `#define ${cPrefix}ASSERT(condition, text) static_assert(condition, text)`,
    '#elif !defined(__cplusplus) && defined(__STDC_VERSION__) && __STDC_VERSION__ >= 201112L',
    `#define ${cPrefix}ASSERT(condition, text) _Static_assert(condition, text)`,
    '#endif',
    `#if defined(${cPrefix}ASSERT)`,
    ...fieldAssertion(cPrefix),
    ...lines,
    ...['ASSERT_FIELD', 'ONES', 'ASSERT'].map((name) => `#undef ${cPrefix}${name}`),
    '#endif',
    '',
  ];
}
