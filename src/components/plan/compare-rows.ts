import type { Design, LoopDesign, StageDesign } from '../../../shared/model/design';
import type { RegisterMap } from '../../../shared/model/register-map';
import { planChanges } from '../../../shared/plan/changes';
import { numberText, quantityText } from '../../../shared/quantities/format';
import { quantitiesOf } from '../../../shared/registers/quantities';
import { fieldLabel, fieldText } from './field-text';
import { wordsOf } from './register-drawings';
import { countsOf } from './verdict-of';

/** One side of a comparison: a revision, or the draft. */
export interface CompareSide {
  name: string;
  plan: unknown;
  design: Design | null;
}

export interface CompareRow {
  group: 'What it means' | 'What was typed' | 'Words';
  number?: string;
  label: string;
  before: string;
  after: string;
}

/**
 * Where two states of a plan differ: what it means, what was typed, what the hardware gets.
 *
 * @param map registers of the target; without them the words are listed by name
 */
export function compareRows(before: CompareSide, after: CompareSide, map: RegisterMap | undefined): CompareRow[] {
  return [...meaningRows(before, after), ...typedRows(before, after), ...wordRows(before, after, map)];
}

type Said = ReadonlyMap<string, string>;

function differences(group: CompareRow['group'], before: Said, after: Said): CompareRow[] {
  const labels = [...new Set([...before.keys(), ...after.keys()])];
  return labels
    .map((label) => ({ group, label, before: before.get(label) ?? 'none', after: after.get(label) ?? 'none' }))
    .filter((row) => row.before !== row.after);
}

const meaningRows = (before: CompareSide, after: CompareSide): CompareRow[] =>
  before.design && after.design ? differences('What it means', meaningOf(before.design), meaningOf(after.design)) : [];

function meaningOf(design: Design): Said {
  const loops = [design.carrier, design.clock].filter((loop) => loop !== undefined);
  const prefix = (loop: LoopDesign) => (loops.length < 2 ? '' : loop === design.carrier ? 'carrier ' : 'clock ');
  return new Map([...loops.flatMap((loop) => loopMeaning(loop, prefix(loop))), ...countRows(design)]);
}

const countRows = (design: Design): [string, string][] => {
  const { fail, caution, pass } = countsOf(design);
  return [
    ['Findings that fail', String(fail)],
    ['Findings of caution', String(caution)],
    ['Findings that pass', String(pass)],
  ];
};

function loopMeaning(loop: LoopDesign, prefix: string): [string, string][] {
  const { largestOffsetHz, largestOffsetPpm } = loop.acquisition;
  const held: [string, string][] = [
    [
      `Largest ${prefix}offset held`,
      said(largestOffsetHz, (hz) => `±${quantityText(hz, { unit: 'Hz', significant: 4 })}`),
    ],
    [
      `Largest ${prefix}rate error held`,
      said(largestOffsetPpm, (ppm) => `±${numberText(ppm, { significant: 4 })} ppm`),
    ],
  ];
  const jitter = (loop.budget?.stages ?? []).map(({ stage, total }): [string, string] => [
    `Jitter, ${prefix}${stage}`,
    said(total, (value) =>
      loop.budget?.unit === 'deg' ? `${numberText(value, { decimals: 2 })}°` : numberText(value, { decimals: 4 }),
    ),
  ]);
  return [...held, ...loop.stages.flatMap((stage) => stageMeaning(stage, prefix)), ...jitter];
}

const stageMeaning = (stage: StageDesign, prefix: string): [string, string][] => [
  [`BnT, ${prefix}${stage.name}`, said(stage.noiseBandwidth.exact, (value) => numberText(value, { decimals: 6 }))],
  [`ζ, ${prefix}${stage.name}`, said(stage.damping.exact, (value) => numberText(value, { decimals: 6 }))],
  [
    `Phase margin, ${prefix}${stage.name}`,
    said(stage.margins.phaseDeg, (value) => `${numberText(value, { decimals: 1 })}°`),
  ],
  [`Settles, ${prefix}${stage.name}`, said(stage.settlingUpdates, (value) => `${numberText(value)} updates`)],
];

const said = (value: number | null, say: (value: number) => string): string => (value === null ? 'none' : say(value));

const typedRows = (before: CompareSide, after: CompareSide): CompareRow[] =>
  planChanges(before.plan, after.plan).map(({ pointer, before: was, after: is }) => {
    const { number, label } = fieldLabel(pointer, after.plan);
    const texts = { before: fieldText(pointer, was), after: fieldText(pointer, is) };
    return { group: 'What was typed', ...(number !== undefined && { number }), label, ...texts };
  });

function wordRows(before: CompareSide, after: CompareSide, map: RegisterMap | undefined): CompareRow[] {
  if (!before.design || !after.design) return [];
  const words = (design: Design): Said => (map ? wordsOf(map, design) : quantityWords(design));
  return differences('Words', words(before.design), words(after.design));
}

const quantityWords = (design: Design): Said =>
  new Map(quantitiesOf({ plan: design.plan, design }).map(({ path, value }) => [path, String(value)]));
