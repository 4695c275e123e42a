import { gainOf } from '../fixed-point/gain-words';
import type { SignedGainWord, StageGainWords } from '../model/words';
import { type Gain, gainError, gainOfWord, percent, shortNumber } from './meaning';
import type { Definition, LoopSource } from './quantity';

/** One stage of a loop: its place in the order of running. */
export interface StageSource extends LoopSource {
  index: number;
}

const wordsOf = ({ words, index }: StageSource): StageGainWords => words.stages[index] as StageGainWords;

const title: Record<Gain, string> = {
  proportional: 'proportional gain',
  integral: 'integral gain',
  integral2: 'second integral gain',
};

const leastOrder: Record<Gain, number> = { proportional: 1, integral: 2, integral2: 3 };

function gainText(source: StageSource, gain: Gain, word: SignedGainWord): string {
  if (source.words.order < leastOrder[gain]) return `0: unused in a loop of order ${source.words.order}`;
  const error = gainError(word, gain, source.loop.stages[source.index]?.gains[gain], source.words);
  const text = scaleText(source, gain, word);
  return error === null ? text : `${text}, ${percent(error)} from the wanted gain`;
}

/** M·2^−s in LSB of the node that it drives, and what of it reaches the output. */
function scaleText({ words }: StageSource, gain: Gain, word: SignedGainWord): string {
  const output = `${shortNumber(gainOfWord(word, gain, words))} output LSB`;
  if (gain === 'proportional') return `${output} per error LSB`;
  const own = `${shortNumber(gainOf(word))} ${gain === 'integral' ? 'integrator' : 'second integrator'} LSB`;
  return `${own} per error LSB, that is ${output}`;
}

/** A shift below 0 is easily taken for its magnitude. */
const shiftText = (shift: number): string => (shift === 0 ? '' : shift > 0 ? `right by ${shift}` : `left by ${-shift}`);

function gainDefinitions(gain: Gain): Definition<StageSource>[] {
  const required = ({ words }: StageSource) => words.order >= leastOrder[gain];
  const pointer = '/arithmetic/mantissaBits';
  return [
    {
      name: `${gain}.mantissa`,
      label: `Mantissa of the ${title[gain]}`,
      signed: true,
      pointer,
      read: (source) => wordsOf(source)[gain].mantissa,
      meaning: (source) => gainText(source, gain, wordsOf(source)[gain]),
      required,
    },
    {
      name: `${gain}.shift`,
      label: `Right shift of the ${title[gain]}`,
      signed: true,
      pointer,
      read: (source) => wordsOf(source)[gain].shift,
      meaning: (source) => shiftText(wordsOf(source)[gain].shift),
      required,
    },
  ];
}

const lockText = (threshold: number | null): string =>
  threshold === null ? '256: not by lock' : `${shortNumber(threshold / 256)} of the block power`;

const switching: Definition<StageSource>[] = [
  {
    name: 'untilSymbols',
    label: 'Symbols after which the next stage is loaded',
    pointer: '/stages/*/until/symbols',
    read: (source) => wordsOf(source).untilSymbols ?? 0,
    meaning: (source) => (wordsOf(source).untilSymbols === null ? '0: not by count' : ''),
  },
  {
    name: 'untilLock',
    label: 'The next stage is loaded at lock',
    choices: ['off', 'on'],
    pointer: '/stages/*/until/lockMetric',
    read: (source) => (wordsOf(source).lockThreshold === null ? 'off' : 'on'),
  },
  {
    name: 'lockThreshold',
    label: 'Lock threshold that ends the stage',
    pointer: '/stages/*/until/lockMetric',
    read: (source) => wordsOf(source).lockThreshold ?? 256,
    meaning: (source) => lockText(wordsOf(source).lockThreshold),
  },
];

/** Quantities of one stage, in the order of the files. */
export const stageDefinitions: readonly Definition<StageSource>[] = [
  ...gainDefinitions('proportional'),
  ...gainDefinitions('integral'),
  ...gainDefinitions('integral2'),
  ...switching,
];
