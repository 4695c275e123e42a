import type { Field, Register } from '../model/register-map';

/** C macro of a register without the target's prefix, for example `CAR_FCW_ADDR`. */
export type RegisterMacro = 'OFFSET' | 'ADDR' | 'RESET' | 'VALUE';
export type FieldMacro = 'SHIFT' | 'WIDTH' | 'MASK' | 'VALUE';

export const registerMacros: readonly RegisterMacro[] = ['OFFSET', 'ADDR', 'RESET', 'VALUE'];
export const fieldMacros: readonly FieldMacro[] = ['SHIFT', 'WIDTH', 'MASK', 'VALUE'];

/** Names that the header defines whatever the map holds. */
export const fixedNames = [
  'BASE_ADDRESS',
  'REGISTER_BITS',
  'MAP_VERSION',
  'ENGINE',
  'PLAN',
  'REVISION',
  'RELEASE',
  'DIGEST',
  'WRITE_COUNT',
  'ASSERT',
  'ASSERT_FIELD',
  'ONES',
];

/** Names of the words begin so; a register's may not. */
export const wordPrefix = 'WORD_';

export const registerName = ({ name }: Pick<Register, 'name'>, macro: RegisterMacro): string =>
  `${name.toUpperCase()}_${macro}`;

/** Macro of a field; without a kind, the stem that its macros share. */
export function fieldName(register: Pick<Register, 'name'>, { name }: Pick<Field, 'name'>, macro?: FieldMacro): string {
  const stem = `${register.name}_${name}`.toUpperCase();
  return macro === undefined ? stem : `${stem}_${macro}`;
}

/** Macro of a quantity: `carrier.track.untilSymbols` gives `WORD_CARRIER_TRACK_UNTIL_SYMBOLS`. */
export const wordName = (path: string): string =>
  wordPrefix +
  path
    .replace(/([a-z0-9])([A-Z])/g, '$1_$2')
    .replaceAll('.', '_')
    .toUpperCase();
