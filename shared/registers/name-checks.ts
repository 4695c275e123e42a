import type { Finding } from '../model/design';
import type { RegisterMap } from '../model/register-map';
import { fieldMacros, fieldName, fixedNames, registerMacros, registerName, wordPrefix } from './c-names';
import { mapFinding } from './map-finding';

interface Named {
  name: string;
  pointer: string;
}

const identifier = /^[A-Za-z][A-Za-z0-9_]{0,39}$/;

const identifierFault = ({ name, pointer }: Named): Finding[] =>
  identifier.test(name)
    ? []
    : [
        mapFinding({
          slug: 'map.identifier',
          title: 'Its name is no C identifier',
          reason: `“${name}” must begin with a letter and hold letters, digits and underscores only, at most 40.`,
          fields: [`${pointer}/name`],
        }),
      ];

/** Macros are in capitals, so two names that differ in case only are one. */
function duplicateFaults(names: readonly Named[], what: string): Finding[] {
  const firsts = new Map<string, Named>();
  return names.flatMap((named) => {
    const key = named.name.toUpperCase();
    const first = firsts.get(key);
    firsts.set(key, first ?? named);
    if (!first) return [];
    return [
      mapFinding({
        slug: 'map.duplicate-name',
        title: `Two ${what} have one name`,
        reason: `“${first.name}” and “${named.name}” give the same macros in the header.`,
        fields: [`${named.pointer}/name`, `${first.pointer}/name`],
      }),
    ];
  });
}

const fieldsOf = ({ registers }: RegisterMap, index: number): Named[] =>
  (registers[index]?.fields ?? []).map(({ name }, at) => ({ name, pointer: `/registers/${index}/fields/${at}` }));

/** Every macro that the map defines, with the pointer of what defines it. */
function macrosOf({ registers }: RegisterMap): Named[] {
  return registers.flatMap((register, index) => [
    ...registerMacros.map((macro) => ({ name: registerName(register, macro), pointer: `/registers/${index}` })),
    ...register.fields.flatMap((field, at) =>
      fieldMacros.map((macro) => ({
        name: fieldName(register, field, macro),
        pointer: `/registers/${index}/fields/${at}`,
      })),
    ),
  ]);
}

const macroFinding = (name: string, pointers: string[]): Finding =>
  mapFinding({
    slug: 'map.macro',
    title: 'Two names give one macro',
    reason: `The header would define ${name} twice; rename one of them.`,
    fields: pointers.map((pointer) => `${pointer}/name`),
  });

/** Register A with field B_C and register A_B with field C both give A_B_C_SHIFT. */
function macroFaults(map: RegisterMap): Finding[] {
  const firsts = new Map<string, string>(fixedNames.map((name) => [name, '']));
  const reported = new Set<string>();
  return macrosOf(map).flatMap(({ name, pointer }) => {
    const first = firsts.get(name);
    firsts.set(name, first ?? pointer);
    const clash = (first !== undefined && first !== pointer) || name.startsWith(wordPrefix);
    if (!clash || reported.has(pointer)) return [];
    reported.add(pointer);
    return [macroFinding(name, first ? [pointer, first] : [pointer])];
  });
}

/** Names that C could not take, or that would be defined twice. */
export function nameFindings(map: RegisterMap): Finding[] {
  const registers = map.registers.map(({ name }, index) => ({ name, pointer: `/registers/${index}` }));
  const fields = map.registers.map((_, index) => fieldsOf(map, index));
  const duplicates = [
    ...duplicateFaults(registers, 'registers'),
    ...fields.flatMap((names) => duplicateFaults(names, 'fields of a register')),
  ];
  // A duplicate name clashes in every macro: saying so once is enough.
  const clashes = duplicates.length ? [] : macroFaults(map);
  return [...[...registers, ...fields.flat()].flatMap(identifierFault), ...duplicates, ...clashes];
}
