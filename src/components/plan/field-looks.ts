import { fieldOf } from '../../../shared/plan/fields';
import { ruleAt } from '../../../shared/plan/rules';
import type { Unit } from '../../../shared/quantities/units';

export interface Option {
  value: string | number | boolean;
  label: string;
}

/** How the sheet shows and takes the value of a field. */
export interface FieldLook {
  control: 'number' | 'select' | 'segments';
  unit: Unit;
  options: Option[];
  /** Fewest decimals shown. */
  decimals?: number;
  /** Shown with ±: the value is the magnitude. */
  symmetric?: boolean;
  integer?: boolean;
  /** May be left empty. */
  optional?: boolean;
  /** The plan holds log2 of the number on the sheet. */
  power?: boolean;
  /** What a ratio in this field is a ratio of: the carrier or the symbol rate. */
  ratioOf?: 'carrier' | 'symbol-rate';
}

const labels: Record<string, string> = {
  costas: 'Costas',
  sign: 'Sign',
  decision: 'Decision-directed',
  'power-law': 'Power law',
  'known-symbols': 'Known symbols',
  gardner: 'Gardner',
  'zero-crossing': 'Zero crossing',
  'mueller-muller': 'Mueller–Müller',
  'early-late': 'Early–late',
  linear: 'Linear',
  parabolic: 'Parabolic',
  cubic: 'Cubic',
  polyphase: 'Polyphase bank',
  multiplier: 'Multiplier',
  shift: 'Shift',
  'shift-add': 'Shift and add',
  convergent: 'even',
};

/** What differs from what the schema and the table of fields already say; a loop's own key is left out. */
const looks: Record<string, Partial<FieldLook>> = {
  '/signal/rollOff': { decimals: 2 },
  '/signal/amplitude': { decimals: 2 },
  '/signal/amplitudeToleranceDb': { decimals: 1 },
  '/signal/sampleFullScaleLog2': { power: true, symmetric: true },
  '/environment/carrierFrequencyHz': { optional: true },
  '/environment/carrierTolerancePpm': { ratioOf: 'carrier' },
  '/environment/dopplerHz': { ratioOf: 'carrier' },
  '/environment/clockTolerancePpm': { ratioOf: 'symbol-rate' },
  '/limits/phaseJitterDeg': { unit: '° rms', decimals: 1 },
  '/limits/timingJitterSymbols': { decimals: 3 },
  '/limits/bandwidthError': { unit: '%', decimals: 1 },
  '/limits/dampingError': { unit: '%', decimals: 1 },
  '/limits/implementationLossDb': { decimals: 2 },
  'stages/*/damping': { optional: true },
  'stages/*/noiseBandwidth': { ratioOf: 'symbol-rate' },
  'stages/*/until/symbols': { optional: true, unit: 'symbols' },
  'stages/*/until/lockMetric': { optional: true, decimals: 2 },
  'nco/centreHz': { ratioOf: 'carrier' },
  'arithmetic/errorFullScaleLog2': { power: true, symmetric: true },
  'arithmetic/integratorLimitHz': { optional: true, ratioOf: 'carrier' },
  'arithmetic/integratorLimitPpm': { optional: true, ratioOf: 'symbol-rate' },
  'arithmetic/gainForm': { control: 'select' },
  'arithmetic/overflow': {
    control: 'segments',
    options: [
      { value: 'saturate', label: 'saturate' },
      { value: 'wrap', label: 'wrap' },
      { value: 'each', label: 'each' },
    ],
  },
  'lockDetector/threshold': { decimals: 2 },
  polarity: {
    options: [
      { value: 1, label: '+1' },
      { value: -1, label: '−1' },
    ],
  },
  prewarp: {
    options: [
      { value: false, label: 'off' },
      { value: true, label: 'on' },
    ],
  },
  hold: {
    options: [
      { value: true, label: 'held' },
      { value: false, label: 'once' },
    ],
  },
};

/** How a field is shown: from the schema's rule, the table of fields, and the few things that only the sheet knows. */
export function lookOf(pointer: string): FieldLook {
  const rule = ruleAt(pointer) ?? {};
  const field = fieldOf(pointer);
  const options = (rule.enum ?? []).map((value) => ({ value, label: labels[value] ?? String(value) }));
  const special = looks[field?.pointer.replace(/^\/(carrier|clock)\//, '') ?? ''] ?? looks[field?.pointer ?? ''] ?? {};
  return {
    control:
      rule.type === 'boolean' || (options.length > 0 && options.length < 4)
        ? 'segments'
        : options.length > 0
          ? 'select'
          : 'number',
    unit: (field?.unit ?? '') as Unit,
    options,
    integer: rule.type === 'integer',
    ...(field?.symmetric && { symmetric: true }),
    ...special,
  };
}

/** The range that a field takes, as it stands on the sheet; “above 0” is left to the server's own words. */
export function rangeOf(pointer: string): { min?: number; max?: number } {
  const { minimum, maximum } = ruleAt(pointer) ?? {};
  const shown = (value: number): number => (lookOf(pointer).power ? 2 ** value : value);
  return {
    ...(minimum !== undefined && { min: shown(minimum) }),
    ...(maximum !== undefined && { max: shown(maximum) }),
  };
}
