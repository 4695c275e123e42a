import { valueAt } from '../../../shared/plan/pointer';
import { fieldOf } from '../../../shared/plan/fields';
import { quantityText } from '../../../shared/quantities/format';
import { lookOf } from './field-looks';

/** What the sheet calls the place of a change: number and label, the stage named where it belongs to one. */
export function fieldLabel(pointer: string, plan: unknown): { number: string | undefined; label: string } {
  const whole = wholeLabels[pointer];
  if (whole) return { number: undefined, label: whole };
  const field = fieldOf(pointer);
  const stage = stageName(pointer, plan);
  return { number: field?.no, label: `${field?.label ?? pointer}${stage ? `, ${stage}` : ''}` };
}

const wholeLabels: Record<string, string> = {
  '/name': 'Name',
  '/target': 'Target',
  '/carrier': 'Carrier loop',
  '/clock': 'Clock loop',
};

function stageName(pointer: string, plan: unknown): string | undefined {
  const at = /^\/\w+\/stages\/\d+/.exec(pointer)?.[0];
  const name = at && valueAt(plan, `${at}/name`);
  return typeof name === 'string' ? name : undefined;
}

/** The value of a field as a person reads it, with its unit: `±250 kHz`, `Decision-directed`, `none`. */
export function fieldText(pointer: string, value: unknown): string {
  if (value === undefined || value === null) return 'none';
  if (pointer === '/carrier' || pointer === '/clock') return loopText(value);
  if (Array.isArray(value)) return pointer.endsWith('/stages') ? stagesText(value) : listText(pointer, value);
  if (typeof value === 'object') return nodesText(value);
  const look = lookOf(pointer);
  const option = look.options.find((each) => each.value === value);
  if (option) return option.label;
  if (typeof value === 'number') return numberOf(pointer, value);
  return typeof value === 'string' ? value : '';
}

function numberOf(pointer: string, value: number): string {
  const { unit, symmetric, decimals, power } = lookOf(pointer);
  const shown = power ? 2 ** value : value;
  const sign = symmetric && shown !== 0 ? { symmetric: true } : {};
  // ζ = 1/√2 has sixteen digits; four say it.
  const digits = pointer.endsWith('/damping') ? { significant: 4 } : {};
  const one = shown === 1 && (unit === 'updates' || unit === 'symbols');
  if (one) return `1 ${unit.slice(0, -1)}`;
  return quantityText(shown, { unit, ...sign, ...digits, ...(decimals !== undefined && { least: decimals }) });
}

const loopText = (loop: unknown): string => {
  const stages = valueAt(loop, '/stages');
  return `${fieldText('/carrier/detector', valueAt(loop, '/detector'))}, ${Array.isArray(stages) ? stagesText(stages) : ''}`;
};

const stagesText = (stages: unknown[]): string =>
  stages
    .map((stage) => [valueAt(stage, '/name'), valueAt(stage, '/noiseBandwidth')].filter(Boolean).join(' '))
    .join(', ');

const listText = (pointer: string, items: unknown[]): string =>
  pointer.endsWith('/phaseNoise') ? `${items.length} points` : items.join(', ');

/** Per-node overflow: only the nodes that leave the usual. */
const nodesText = (nodes: object): string => {
  const wrapping = Object.entries(nodes).flatMap(([node, mode]) => (mode === 'wrap' ? [node] : []));
  return wrapping.length === 0 ? 'saturate' : `wrap at ${wrapping.join(', ')}`;
};
