import type { HeadroomNode, LoopDesign } from '../../../shared/model/design';
import { quantityText } from '../../../shared/quantities/format';

export interface BitsRow {
  label: string;
  bits: number;
  /** Bits that the signal reaches, the sign apart. */
  reached: number;
  guard: number;
  overflow: boolean;
  headroom: number;
  note: string;
  /** Boxes left free so that weights stand in line. */
  offset: number;
}

export interface BitsAxisMark {
  /** Index of a box from the left. */
  at: number;
  label: string;
  sub?: string;
}

export interface BitsGroup {
  heading: string;
  rows: BitsRow[];
  axis: BitsAxisMark[];
}

const names: Record<HeadroomNode['node'], string> = {
  sample: 'Sample',
  error: 'Error',
  proportional: 'Proportional',
  increment: 'Increment',
  integrator: 'Integrator',
  'frequency-word': 'Frequency word',
};

const ahead: readonly HeadroomNode['node'][] = ['sample', 'error'];

/**
 * The nodes of a loop as rows of bits: those before the gains in their own units, those behind them with their weights
 * in line. Of a node that every stage has, the stage with the least headroom is shown.
 *
 * @param oscillator what the words behind the gains count: “NCO” or “Counter”
 */
export function headroomGroups({ headroom, resolutionHz }: LoopDesign, oscillator: string): BitsGroup[] {
  const tightest = worstOfEachNode(headroom);
  const before = tightest.filter(({ node }) => ahead.includes(node));
  const behind = tightest.filter(({ node }) => !ahead.includes(node));
  const top = Math.max(0, ...behind.map(bitsAboveGuard));
  const groups = [
    { heading: 'Detector units', rows: before.map((node) => bitsRow(node, 0)), axis: [] },
    {
      heading: `${oscillator} units, weights in line`,
      rows: behind.map((node) => bitsRow(node, top - bitsAboveGuard(node))),
      axis: weights(top, Math.max(0, ...behind.map(guardOf)), resolutionHz),
    },
  ];
  return groups.filter(({ rows }) => rows.length > 0);
}

function worstOfEachNode(headroom: readonly HeadroomNode[]): HeadroomNode[] {
  const nodes = [...new Set(headroom.map(({ node }) => node))];
  return nodes.map((node) =>
    headroom
      .filter((each) => each.node === node)
      .reduce((worst, each) => (each.headroomBits < worst.headroomBits ? each : worst)),
  );
}

const guardOf = (node: HeadroomNode): number => node.guardBits ?? 0;
const bitsAboveGuard = (node: HeadroomNode): number => node.widthBits - guardOf(node);

function bitsRow(node: HeadroomNode, offset: number): BitsRow {
  const { widthBits: bits, headroomBits: headroom } = node;
  const free = Math.max(0, Math.floor(headroom));
  return {
    label: node.stage ? `${names[node.node]}, ${node.stage}` : names[node.node],
    ...{ bits, guard: guardOf(node), headroom, offset },
    reached: Math.max(0, bits - 1 - free - guardOf(node)),
    overflow: headroom < 0,
    note: `${bits} bits`,
  };
}

/** A mark at the top weight, at each eighth bit and at the lowest guard bit, with its frequency where it has one. */
function weights(top: number, guard: number, resolutionHz: number | null): BitsAxisMark[] {
  const highest = top - 2;
  const eighths = Array.from({ length: Math.max(0, Math.ceil(highest / 8)) }, (_, index) => 8 * (index + 1) - 1);
  const marked = [highest, ...eighths.filter((weight) => weight < highest - 3).reverse(), 0];
  const marks = marked.map((weight) => ({
    at: top - 1 - weight,
    label: String(weight),
    ...(resolutionHz !== null && { sub: quantityText(resolutionHz * 2 ** weight, { unit: 'Hz', significant: 3 }) }),
  }));
  return guard > 0 ? [...marks, { at: top - 1 + guard, label: `−${guard}` }] : marks;
}
