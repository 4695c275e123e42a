import { registerValues } from '../registers/binding';
import { quantitiesOf } from '../registers/quantities';
import type { FileInput } from './file-input';
import { guardName, headComment, identity } from './header-head';
import { faults, registers } from './header-registers';
import { assertions, writeTable } from './header-table';
import { words } from './header-words';

/**
 * The C header of a revision: C99 and C++11, `<stdint.h>` only, the same bytes for the same input. A word that its
 * field cannot hold makes the header refuse to compile.
 *
 * @param input a revision and its target, whose register map has no failing finding
 */
export function configHeader(input: FileInput): string {
  const guard = guardName(input);
  const quantities = quantitiesOf(input);
  const values = registerValues(input.target.registerMap, quantities);
  return [
    ...headComment(input),
    `#ifndef ${guard}`,
    `#define ${guard}`,
    '',
    '#include <stdint.h>',
    '',
    ...identity(input),
    '',
    ...faults(values),
    ...words(input, quantities),
    ...registers(input, values),
    ...writeTable(input, values),
    ...assertions(input, values),
    `#endif /* ${guard} */`,
    '',
  ].join('\n');
}
