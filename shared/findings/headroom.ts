import type { Finding, HeadroomNode } from '../model/design';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

interface NodeCheck {
  /** Title of the fault, after the loop's name where there are two loops. */
  fault: string;
  sound: string;
  /** What happens beyond the word. */
  why: string;
  field: (view: LoopView) => string;
  remedy: (view: LoopView, missingBits: number) => Remedy | null;
  /** Whether saturation at this node is a failure, or costs only a little. */
  fatal: boolean;
}

const fractionOfBits = 1e-9;

/** Widens a word of the loop by whole bits, as far as the schema goes. */
const widen =
  (path: string, most: number) =>
  (view: LoopView, missing: number): Remedy | null => {
    const width = path
      .split('/')
      .reduce<unknown>((value, key) => (value as Record<string, unknown>)[key], view.loop) as number;
    const wanted = width + Math.ceil(missing - fractionOfBits);
    return wanted <= most ? setTo(numberOf(view, path), pointerOf(view, path), wanted, `${wanted} bits`) : null;
  };

const oscillator = (view: LoopView): string => (view.key === 'carrier' ? 'nco/widthBits' : 'counter/widthBits');

const checks: Record<HeadroomNode['node'], NodeCheck> = {
  sample: {
    sound: 'Samples stay inside their word',
    fault: 'Samples leave their word',
    why: 'Clipped samples lower the detector’s gain.',
    field: () => '/signal/sampleFullScaleLog2',
    remedy: ({ plan }, missing) =>
      raise('/signal/sampleFullScaleLog2', '1.9', plan.signal.sampleFullScaleLog2, missing),
    fatal: false,
  },
  error: {
    sound: 'The error stays inside its word',
    fault: 'The error leaves its word',
    why: 'A clipped error lowers the gain when noise peaks.',
    field: (view) => pointerOf(view, 'arithmetic/errorFullScaleLog2'),
    remedy: (view, missing) => {
      const path = 'arithmetic/errorFullScaleLog2';
      return raise(pointerOf(view, path), numberOf(view, path), view.loop.arithmetic.errorFullScaleLog2, missing);
    },
    fatal: false,
  },
  proportional: {
    sound: 'The proportional path fits its word',
    fault: 'The proportional path leaves its word',
    why: 'Beyond its word the loop loses the gain that keeps it damped.',
    field: (view) => pointerOf(view, oscillator(view)),
    remedy: (view) => ({
      remedy: `Lower ${numberOf(view, 'stages/0/noiseBandwidth')}, or the scale of the error (${numberOf(view, 'arithmetic/errorFullScaleLog2')}).`,
      change: null,
    }),
    fatal: true,
  },
  increment: {
    sound: 'The integrator’s increment fits its word',
    fault: 'The integrator’s increment leaves its word',
    why: 'Beyond its word the integrator moves by less than it should, or the wrong way.',
    field: (view) => pointerOf(view, 'arithmetic/integratorBits'),
    remedy: widen('arithmetic/integratorBits', 64),
    fatal: true,
  },
  integrator: {
    sound: 'The integrator holds the offset',
    fault: 'The integrator is too narrow',
    why: 'Beyond its range the loop cannot follow the offset.',
    field: (view) => pointerOf(view, 'arithmetic/integratorBits'),
    remedy: widen('arithmetic/integratorBits', 64),
    fatal: true,
  },
  'frequency-word': {
    sound: 'The frequency word is wide enough',
    fault: 'The frequency word overflows',
    why: 'It wraps by design: the oscillator would turn at another frequency.',
    field: (view) => pointerOf(view, oscillator(view)),
    remedy: () => null,
    fatal: true,
  },
};

const limitOf = ({ loop }: LoopView): number | undefined => {
  const arithmetic: { integratorLimitHz?: number; integratorLimitPpm?: number } = loop.arithmetic;
  return arithmetic.integratorLimitHz ?? arithmetic.integratorLimitPpm;
};

const raise = (pointer: string, no: string, value: number, missing: number): Remedy => {
  const wanted = value + Math.ceil(missing - fractionOfBits);
  // The sheet shows the full scale itself, not its logarithm.
  return setTo(no, pointer, wanted, `±${say(2 ** wanted)}`);
};

/** Headroom of each node of the datapath at its worst stage. */
export function headroomFindings(view: LoopView): Finding[] {
  const nodes = [...new Set(view.design.headroom.map(({ node }) => node))];
  return nodes.map((name) => {
    const same = view.design.headroom.filter(({ node }) => node === name).map((node) => ofWord(view, node));
    return nodeFinding(
      view,
      same.reduce((worst, each) => (each.headroomBits < worst.headroomBits ? each : worst)),
    );
  });
}

/** The limit of an integrator is a matter of acquisition; here its word alone counts. */
function ofWord(view: LoopView, node: HeadroomNode): HeadroomNode {
  if (node.node !== 'integrator' || limitOf(view) === undefined) return node;
  return { ...node, headroomBits: node.widthBits - 1 - node.reachedBits };
}

function nodeFinding(view: LoopView, node: HeadroomNode): Finding {
  const check = checks[node.node];
  const limit = view.plan.limits.headroomBits;
  const severity = severityOf(view, node, { limit, fatal: check.fatal });
  const title = passed(severity, check.sound, check.fault);
  return finding({
    slug: `headroom.${node.node}`,
    severity,
    title:
      view.plan.carrier && view.plan.clock
        ? `${view.key === 'carrier' ? 'Carrier' : 'Clock'}: ${lowerFirst(title)}`
        : title,
    value: node.headroomBits,
    limit,
    sense: 'min',
    unit: 'bits',
    reason: severity === 'pass' ? amountOf(node) : `${amountOf(node)} ${check.why}`,
    ...remedyUnless(severity, () => check.remedy(view, limit - node.headroomBits)),
    fields: [check.field(view), '/limits/headroomBits'],
    source: 'follows from the datapath, signal with 4σ of noise',
  });
}

function amountOf({ stage, signal, headroomBits, widthBits }: HeadroomNode): string {
  const what = stage ? `Stage ${stage}: the ${signal}` : upperFirst(signal);
  return headroomBits < 0
    ? `${what} needs ${say(-headroomBits)} bits more than the ${widthBits} there are.`
    : `${what} leaves ${say(headroomBits)} of ${widthBits} bits.`;
}

function severityOf(
  view: LoopView,
  { node, headroomBits }: HeadroomNode,
  { limit, fatal }: { limit: number; fatal: boolean },
): Severity {
  if (headroomBits >= limit) return 'pass';
  const overflow = node === 'frequency-word' ? 'wrap' : view.loop.arithmetic.overflow[node];
  return headroomBits < 0 && ((fatal && isReached(view, node)) || overflow === 'wrap') ? 'fail' : 'caution';
}

/** A clock loop is measured by a full-scale error, which its signal need not ever make. */
const isReached = ({ key }: LoopView, node: HeadroomNode['node']): boolean =>
  key === 'carrier' || node === 'integrator';

const upperFirst = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
