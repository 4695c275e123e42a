import type { Achieved, LoopDesign, StageDesign } from '../model/design';
import type { Plan } from '../model/plan';
import { wordName } from '../registers/c-names';
import { percent, shortNumber } from '../registers/meaning';
import { stageOf, type LoopName, type QuantityValue } from '../registers/quantities';
import { cText, wrapText } from './c-text';
import { decimalConstant, defineBlock } from './c-constant';
import type { FileInput } from './file-input';
import { comment } from './header-head';
import { howToRead } from './how-to-read';

const shown = (value: number | null): string => (value === null ? 'none' : shortNumber(value));

function achieved(label: string, { wanted, exact, effective }: Achieved, error: number | null, unit = ''): string {
  const behind = unit === '' ? '' : ` ${unit}`;
  const from = error === null ? '' : ` (${percent(error)})`;
  return `  ${label}: ${shown(wanted)} wanted, ${shown(exact)} exact, ${shown(effective)} from these words${from}${behind}`;
}

const loopTitle = { carrier: 'Carrier loop', clock: 'Clock loop' } as const;

const stageComment = (loop: LoopName, stage: StageDesign): string[] =>
  comment([
    `${loopTitle[loop]}, stage ${stage.name}`,
    ...(stage.stable ? [] : ['  UNSTABLE with its delay: do not use']),
    achieved('BnT, cycles per symbol', stage.noiseBandwidth, stage.bandwidthError),
    achieved('Bn, Hz', stage.noiseBandwidthHz, null),
    achieved('zeta', stage.damping, stage.dampingError),
    achieved('Natural frequency, Hz', stage.naturalFrequencyHz, null),
    `  Phase margin, deg: ${shown(stage.margins.phaseDeg)} exact, ${shown(stage.effectivePhaseDeg)} from these words`,
  ]);

/** What the gains were worked out for: another amplitude or Es/N0 is another detector gain. */
const signalText = ({ modulation, symbolRateBd, amplitude, esN0Db }: Plan['signal']): string =>
  `  Signal: ${modulation}, ${shortNumber(symbolRateBd)} Bd, amplitude ${amplitude}, Es/N0 ${esN0Db} dB`;

const loopComment = (loop: LoopName, { updateRateHz, detector, resolutionHz }: LoopDesign, plan: Plan): string[] =>
  comment([
    loopTitle[loop],
    signalText(plan.signal),
    `  Updates per second: ${shortNumber(updateRateHz)}`,
    `  Detector gain Kd: ${shortNumber(detector.gain)} detector units per ${loop === 'carrier' ? 'rad' : 'symbol'}`,
    `  One output LSB, Hz: ${shown(resolutionHz)} of ${loop === 'carrier' ? 'carrier frequency' : 'symbol rate'}`,
  ]);

function wordMacros(prefix: string, quantities: readonly QuantityValue[]): string[] {
  return defineBlock(
    quantities.map(({ path, value, signed, label, meaning }) => ({
      name: prefix + wordName(path),
      value: decimalConstant(value, signed),
      comment: cText(meaning === '' ? label : meaning),
    })),
  );
}

function loopLines(
  loop: LoopName,
  design: LoopDesign | undefined,
  quantities: QuantityValue[],
  { plan, target: { cPrefix: prefix } }: FileInput,
): string[] {
  if (!design) return [];
  const own = quantities.filter(({ path }) => path.startsWith(`${loop}.`));
  const stages = design.stages.flatMap((stage) => [
    ...stageComment(loop, stage),
    ...wordMacros(
      prefix,
      own.filter(({ path }) => path.startsWith(`${loop}.${stage.name}.`) && stageOf(path) === stage.name),
    ),
    '',
  ]);
  const rest = own.filter(({ path }) => stageOf(path) === undefined);
  return [...stages, ...loopComment(loop, design, plan), ...wordMacros(prefix, rest), ''];
}

/** Every word of the plan as a macro, whether or not a register holds it, with what it means. */
export function words(input: FileInput, quantities: QuantityValue[]): string[] {
  const { carrier, clock } = input.design;
  return [
    ...comment([
      'Words of the plan. A choice is given by its standard code; a register may use another.',
      '',
      ...howToRead.flatMap((text) => wrapText(text, 88)),
    ]),
    '',
    ...loopLines('carrier', carrier, quantities, input),
    ...loopLines('clock', clock, quantities, input),
  ];
}
