import type { CarrierWords, ClockWords, OverflowByNode } from '../model/words';
import { carrierLimitText, clockLimitText, frequencyWordText, nominalStepText, shortNumber } from './meaning';
import type { Definition, LoopName, LoopSource } from './quantity';

const polarities = ['normal', 'inverted'] as const;
const signs = ['plus', 'minus'] as const;

/** Full scale where the plan sets no limit: a limit of 0 would hold the integrator at 0. */
function limitOf({ words }: LoopSource): bigint {
  const { integratorLimit, integratorBits } = words;
  return integratorLimit === null ? (1n << BigInt(integratorBits - 1)) - 1n : BigInt(integratorLimit);
}

const number = (
  name: string,
  label: string,
  pointer: string,
  read: (source: LoopSource) => number,
): Definition<LoopSource> => ({ name, label, pointer, read });

const overflowNode = (node: keyof OverflowByNode): Definition<LoopSource> => ({
  name: `overflow.${node}`,
  label: `Overflow of the ${node} node`,
  choices: ['saturate', 'wrap'],
  pointer: '/arithmetic/overflow',
  read: ({ words }) => words.overflow[node],
});

const nodes = ['sample', 'error', 'proportional', 'increment', 'integrator', 'increment2', 'integrator2'] as const;

const updates: Definition<LoopSource>[] = [
  number('order', 'Order of the loop', '/order', ({ words }) => words.order),
  number('symbolsPerUpdate', 'Symbols added for one update', '/updateInterval', ({ words }) => words.symbolsPerUpdate),
  number('updatesPerSymbol', 'Updates that one error serves', '/updateInterval', ({ words }) => words.updatesPerSymbol),
  number('delay', 'Extra pipeline delay, updates', '/delay', ({ words }) => words.delay),
];

const arithmetic: Definition<LoopSource>[] = [
  number('sampleBits', 'Width of a sample', '//signal/sampleBits', ({ words }) => words.sampleBits),
  {
    ...number('sampleFullScaleLog2', 'log2 of the sample value at full scale', '', (s) => s.words.sampleFullScaleLog2),
    signed: true,
    pointer: '//signal/sampleFullScaleLog2',
  },
  number('errorBits', 'Width of the error word', '/arithmetic/errorBits', ({ words }) => words.errorBits),
  {
    ...number(
      'errorFullScaleLog2',
      'log2 of the detector value at error full scale',
      '',
      (s) => s.words.errorFullScaleLog2,
    ),
    signed: true,
    pointer: '/arithmetic/errorFullScaleLog2',
  },
  number(
    'integratorBits',
    'Width of the integrator',
    '/arithmetic/integratorBits',
    ({ words }) => words.integratorBits,
  ),
  number('guardBits', 'Guard bits of the integrator', '/arithmetic/guardBits', ({ words }) => words.guardBits),
  number(
    'integrator2Bits',
    'Width of the second integrator',
    '/arithmetic/integrator2Bits',
    (s) => s.words.integrator2Bits,
  ),
  number('guard2Bits', 'Guard bits of the second integrator', '/arithmetic/guard2Bits', (s) => s.words.guard2Bits),
  {
    name: 'rounding',
    label: 'Rounding of every node',
    choices: ['floor', 'nearest', 'convergent'],
    pointer: '/arithmetic/rounding',
    read: ({ words }) => words.rounding,
  },
  ...nodes.map(overflowNode),
];

const lock = (loop: LoopName): Definition<LoopSource>[] => [
  number(
    'lock.averagingSymbols',
    'Symbols in a lock block',
    '/lockDetector/averagingSymbols',
    (s) => s.words.lock.averagingSymbols,
  ),
  {
    ...number('lock.threshold', 'Lock threshold in 1/256 of the block power', '/lockDetector/threshold', ({ plan }) =>
      Math.floor(256 * (plan[loop]?.lockDetector?.threshold ?? 0.5)),
    ),
    meaning: ({ plan }) =>
      `${shortNumber(Math.floor(256 * (plan[loop]?.lockDetector?.threshold ?? 0.5)) / 256)} of the block power`,
  },
  number('lock.power', 'Power M of the lock statistic', '//signal/modulation', ({ words }) => words.lock.power),
  {
    name: 'lock.sign',
    label: 'Sign of the lock statistic',
    choices: signs,
    pointer: '//signal/modulation',
    read: ({ words }) => (words.lock.sign === 1 ? 'plus' : 'minus'),
  },
];

const limit = (pointer: string): Definition<LoopSource>[] => [
  {
    name: 'integratorLimited',
    label: 'The integrator has a limit',
    choices: ['off', 'on'],
    pointer,
    read: ({ words }) => (words.integratorLimit === null ? 'off' : 'on'),
  },
];

const polarity = (loop: LoopName): Definition<LoopSource> => ({
  name: 'polarity',
  label: 'Polarity; the mantissas carry it already',
  choices: polarities,
  pointer: '/polarity',
  read: ({ plan }) => (plan[loop]?.polarity === -1 ? 'inverted' : 'normal'),
});

const limitPointer = { carrier: '/arithmetic/integratorLimitHz', clock: '/arithmetic/integratorLimitPpm' } as const;

const common = (loop: LoopName): Definition<LoopSource>[] => [
  ...updates,
  polarity(loop),
  ...arithmetic,
  ...limit(limitPointer[loop]),
  ...lock(loop),
];

/** Quantities of a carrier loop besides those of its stages, in the order of the files. */
export const carrierDefinitions: readonly Definition<LoopSource<CarrierWords>>[] = [
  {
    name: 'detector',
    label: 'Phase error detector',
    choices: ['costas', 'sign', 'decision', 'power-law', 'known-symbols'],
    pointer: '/detector',
    read: ({ words }) => words.detector,
  },
  {
    name: 'nco.fcw',
    label: 'Frequency control word at a zero loop word',
    pointer: '/nco/centreHz',
    read: ({ words }) => BigInt(words.nco.fcw),
    meaning: frequencyWordText,
    required: ({ words }) => BigInt(words.nco.fcw) !== 0n,
  },
  {
    name: 'nco.widthBits',
    label: 'Width of the NCO',
    pointer: '/nco/widthBits',
    read: ({ words }) => words.nco.widthBits,
  },
  {
    name: 'nco.phaseBits',
    label: 'Phase bits that reach the rotator',
    pointer: '/nco/phaseBits',
    read: ({ words }) => words.nco.phaseBits,
  },
  {
    name: 'nco.tableBits',
    label: 'Width of a rotator table entry',
    pointer: '/nco/tableBits',
    read: ({ words }) => words.tableBits,
  },
  {
    name: 'nco.stepsPerSymbol',
    label: 'NCO steps per symbol',
    pointer: '/nco/stepsPerSymbol',
    read: ({ words }) => words.nco.stepsPerSymbol,
  },
  {
    name: 'integratorLimit',
    label: 'Limit of the integrator in its own LSB',
    pointer: limitPointer.carrier,
    read: limitOf,
    meaning: carrierLimitText,
    required: ({ words }) => words.integratorLimit !== null,
  },
  ...common('carrier'),
];

/** Quantities of a clock loop besides those of its stages, in the order of the files. */
export const clockDefinitions: readonly Definition<LoopSource<ClockWords>>[] = [
  {
    name: 'detector',
    label: 'Timing detector',
    choices: ['gardner', 'zero-crossing', 'mueller-muller', 'early-late'],
    pointer: '/detector',
    read: ({ words }) => words.detector,
  },
  {
    name: 'interpolator',
    label: 'Interpolator',
    choices: ['linear', 'parabolic', 'cubic', 'polyphase'],
    pointer: '/interpolator',
    read: ({ words }) => words.interpolator,
  },
  {
    name: 'hold',
    label: 'The control word acts on every sample of a symbol',
    choices: ['off', 'on'],
    pointer: '/hold',
    read: ({ words }) => (words.hold ? 'on' : 'off'),
  },
  {
    name: 'counter.nominalStep',
    label: 'Nominal step of the counter',
    pointer: '//signal/samplesPerSymbol',
    read: ({ words }) => BigInt(words.counter.nominalStep),
    meaning: nominalStepText,
    required: () => true,
  },
  {
    name: 'counter.widthBits',
    label: 'Width of the counter',
    pointer: '/counter/widthBits',
    read: ({ words }) => words.counter.widthBits,
  },
  {
    name: 'counter.fractionBits',
    label: 'Bits of the fractional interval',
    pointer: '/counter/fractionBits',
    read: ({ words }) => words.counter.fractionBits,
  },
  {
    name: 'counter.tableBits',
    label: 'Width of an interpolator coefficient',
    pointer: '/counter/tableBits',
    read: ({ words }) => words.tableBits,
  },
  {
    name: 'integratorLimit',
    label: 'Limit of the integrator in its own LSB',
    pointer: limitPointer.clock,
    read: limitOf,
    meaning: clockLimitText,
    required: ({ words }) => words.integratorLimit !== null,
  },
  ...common('clock'),
];
