import fc from 'fast-check';
import planSchema from '../../schemas/plan.schema.json';
import { filled } from './sample-plan';
import type { Plan } from '../../shared/model/plan';

/** What a JSON Schema says of one value, as far as a plan's schema says it. */
export interface SchemaNode {
  $ref?: string;
  type?: string;
  enum?: unknown[];
  default?: unknown;
  minimum?: number;
  maximum?: number;
  exclusiveMinimum?: number;
  minItems?: number;
  maxItems?: number;
  items?: SchemaNode | false;
  prefixItems?: SchemaNode[];
  properties?: Record<string, SchemaNode>;
  required?: string[];
  anyOf?: SchemaNode[];
}

type Any = fc.Arbitrary<unknown>;

/** A number between two others, both above 0, spread evenly over its logarithm. */
const spread = (low: number, high: number) =>
  fc
    .double({ min: Math.log(low), max: Math.log(high), noNaN: true })
    .map((x) => Math.min(Math.max(Math.exp(x), low), high));
const evenly = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const between = (min: number, max: number) => fc.integer({ min, max });
const oneOf = fc.constantFrom<unknown[]>;
/** The first so many times out of a hundred, else the second. */
const mostly = (percent: number, usual: Any, rest: Any): Any =>
  fc.oneof({ weight: percent, arbitrary: usual }, { weight: 100 - percent, arbitrary: rest });

/**
 * Values with which most plans can be worked out, by pointer; `*` for an index or for either loop. What is not here
 * takes any value of its schema.
 */
const usual: Record<string, Any> = {
  '/signal/modulation': oneOf('BPSK', 'QPSK', 'QPSK', 'OQPSK', '8PSK', '16QAM', '64QAM', '16APSK', '32APSK'),
  '/signal/symbolRateBd': spread(1e2, 1e9),
  '/signal/samplesPerSymbol': oneOf(2, 2, 2.5, 4),
  '/signal/rollOff': evenly(0.05, 1),
  '/signal/esN0Db': evenly(0, 40),
  '/signal/amplitude': spread(0.2, 2),
  '/signal/amplitudeToleranceDb': evenly(0, 6),
  '/signal/sampleBits': between(8, 16),
  '/signal/sampleFullScaleLog2': between(0, 2),
  '/*/order': oneOf(2, 2, 2, 3, 1),
  '/*/updateInterval': oneOf(1, 1, 1, 2, 4, 64),
  '/*/delay': between(0, 10),
  '/*/stages/*/damping': evenly(0.3, 3),
  '/*/stages/*/noiseBandwidth': spread(1e-5, 0.03),
  '/*/stages/*/naturalFrequencyHz': spread(1, 1e5),
  '/*/nco/stepsPerSymbol': oneOf(1, 1, 4),
  '/*/arithmetic/errorBits': between(8, 20),
  '/*/arithmetic/errorFullScaleLog2': between(0, 4),
  '/*/arithmetic/mantissaBits': between(4, 20),
  '/*/arithmetic/integratorBits': between(32, 56),
  '/*/arithmetic/guardBits': between(0, 16),
  '/*/arithmetic/integrator2Bits': between(40, 60),
  '/*/arithmetic/guard2Bits': between(0, 16),
  '/*/arithmetic/integratorLimitHz': spread(1e3, 1e9),
  '/*/arithmetic/integratorLimitPpm': spread(10, 1e5),
  '/clock/detector': oneOf('gardner', 'gardner', 'zero-crossing', 'mueller-muller', 'early-late'),
  '/clock/interpolator': oneOf('cubic', 'linear', 'parabolic', 'polyphase'),
  '/environment/carrierFrequencyHz': spread(1e6, 1e11),
  '/environment/carrierTolerancePpm': spread(0.1, 100),
  '/environment/dopplerHz': spread(0.1, 1e5),
  '/environment/clockTolerancePpm': spread(0.1, 100),
};

const usualAt = (pointer: string): Any | undefined =>
  usual[pointer] ?? usual[pointer.replace(/^\/(carrier|clock)\//, '/*/')];

const resolved = (node: SchemaNode): SchemaNode =>
  node.$ref ? (planSchema.$defs as Record<string, SchemaNode>)[node.$ref.replace('#/$defs/', '')]! : node;

/** Any value of a schema; `wild` of a hundred values ignore what is usual. */
function valueOf(schema: SchemaNode, pointer: string, wild: number): Any {
  const node = resolved(schema);
  const fitting = usualAt(pointer);
  return fitting ? mostly(100 - wild, fitting, anyOf(node, pointer, wild)) : anyOf(node, pointer, wild);
}

function anyOf(node: SchemaNode, pointer: string, wild: number): Any {
  if (node.enum) return oneOf(...node.enum);
  if (node.anyOf && !node.properties) return fc.oneof(...node.anyOf.map((each) => valueOf(each, pointer, wild)));
  if (node.prefixItems) return fc.tuple(...node.prefixItems.map((each) => valueOf(each, `${pointer}/*`, wild)));
  if (node.type === 'array') return arrayOf(node, pointer, wild);
  if (node.type === 'object') return objectOf(node, pointer, wild);
  if (node.type === 'boolean') return fc.boolean();
  if (node.type === 'integer' || node.type === 'number') return numberOf(node);
  return oneOf('name');
}

function arrayOf({ items, minItems = 0, maxItems = 8 }: SchemaNode, pointer: string, wild: number): Any {
  const each = valueOf(items as SchemaNode, `${pointer}/*`, wild);
  const few = { minLength: minItems, maxLength: Math.min(minItems + 2, maxItems) };
  return fc.oneof(fc.array(each, few), fc.array(each, { minLength: minItems, maxLength: maxItems, size: 'max' }));
}

function objectOf({ properties = {}, required = [] }: SchemaNode, pointer: string, wild: number): Any {
  const made = Object.entries(properties).map(([key, child]) => [key, valueOf(child, `${pointer}/${key}`, wild)]);
  return fc.record(Object.fromEntries(made) as Record<string, Any>, { requiredKeys: required });
}

/** Both ends often, and where the range spans decades every decade of it alike. */
function numberOf({ type, minimum, exclusiveMinimum, maximum = 1 }: SchemaNode): Any {
  const least = minimum ?? exclusiveMinimum! + 1e-12;
  const ends = oneOf(least, maximum);
  if (type === 'integer') {
    const whole = maximum > 1e4 ? spread(1, maximum).map(Math.round) : between(least, maximum);
    return mostly(90, whole, ends);
  }
  const wide = maximum > 100 * Math.max(least, 1e-12) && (least >= 0 || least === -maximum);
  const inside = wide ? decades(least, maximum) : evenly(least, maximum);
  return mostly(90, inside, ends);
}

function decades(least: number, most: number): Any {
  if (least > 0) return spread(least, most);
  if (least === 0) return spread(most * 1e-12, most);
  return fc.tuple(oneOf(1, -1), spread(most * 1e-12, most)).map(([sign, value]) => (sign as number) * value);
}

interface LooseStage {
  name: string;
  damping?: number;
  noiseBandwidth?: number;
  naturalFrequencyHz?: number;
}
interface LooseLoop {
  order?: number;
  stages: LooseStage[];
}
interface LoosePlan {
  signal: { modulation?: string; ringRatios?: number[] };
  carrier?: LooseLoop;
  clock?: LooseLoop;
  environment?: { phaseNoise?: [number, number][] | undefined };
}

/** One target of each stage, as the schema asks. */
function withOneTarget(stage: LooseStage, byFrequency: boolean): LooseStage {
  const { noiseBandwidth = 0.01, naturalFrequencyHz = 100, ...rest } = stage;
  return byFrequency ? { ...rest, naturalFrequencyHz } : { ...rest, noiseBandwidth };
}

/** What values have to keep among one another. */
function consistent(plan: LoosePlan): LoosePlan {
  const rings = { '16APSK': 1, '32APSK': 2 }[plan.signal.modulation ?? 'QPSK'] ?? 0;
  const { ringRatios, ...signal } = plan.signal;
  const rising = ringRatios?.length === rings ? { ringRatios: ringRatios.toSorted((a, b) => a - b) } : {};
  const loop = (key: 'carrier' | 'clock') => (plan[key] ? { [key]: consistentLoop(plan[key]) } : {});
  const phaseNoise = risingOffsets(plan.environment?.phaseNoise ?? []);
  const environment = { ...plan.environment, ...(phaseNoise.length > 1 ? { phaseNoise } : { phaseNoise: undefined }) };
  return { ...plan, ...loop('carrier'), ...loop('clock'), signal: { ...signal, ...rising }, environment };
}

const risingOffsets = (table: [number, number][]): [number, number][] =>
  [...new Map(table)].sort((one, other) => one[0] - other[0]);

function consistentLoop(loop: LooseLoop): LooseLoop {
  const stages = loop.stages.map(({ damping, ...stage }, i) => ({
    ...stage,
    name: `stage${i}`,
    ...((loop.order ?? 2) === 2 && damping !== undefined ? { damping } : {}),
  }));
  return { ...loop, stages };
}

/** A plan that the schema takes, with the choices made that a record of loose keys leaves open. */
function closed([loose, fits, which, byFrequency]: unknown[]): Plan {
  const plan = loose as LoosePlan;
  if (which !== 2 && plan.carrier && plan.clock) delete plan[which === 0 ? 'clock' : 'carrier'];
  if (!plan.carrier && !plan.clock) plan.carrier = { stages: [{ name: 'only', noiseBandwidth: 0.01 }] };
  for (const key of ['carrier', 'clock'] as const) {
    if (!plan[key]) delete plan[key];
    else plan[key].stages = plan[key].stages.map((stage) => withOneTarget(stage, byFrequency as boolean));
  }
  return filled(JSON.parse(JSON.stringify(fits ? consistent(plan) : plan)) as object);
}

const plans = (wild: number): fc.Arbitrary<Plan> =>
  fc
    .tuple(
      valueOf(planSchema as unknown as SchemaNode, '', wild),
      mostly(90, oneOf(true), oneOf(false)),
      mostly(60, oneOf(2), oneOf(0, 1)),
      mostly(80, oneOf(false), oneOf(true)),
    )
    .map(closed);

/** Any plan that the schema accepts: every key over its whole range, though most plans can be worked out. */
export const anyPlan: fc.Arbitrary<Plan> = fc.oneof(
  { weight: 5, arbitrary: plans(0) },
  { weight: 3, arbitrary: plans(3) },
  { weight: 1, arbitrary: plans(30) },
);
