import type { HeadroomNode, LoopDesign } from '../../../shared/model/design';
import { numberText, quantityText } from '../../../shared/quantities/format';

export interface BitsRow {
  label: string;
  bits: number;
  /** Bits that the signal reaches, the guard bits counted, the sign not. */
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

export interface HeadroomContext {
  /** What the words behind the gains count: “NCO” or “Counter”. */
  oscillator: string;
  esN0Db: number;
}

/**
 * The nodes of a loop as rows of bits: those before the gains in their own units, those behind them with their weights
 * in line. Of a node that every stage has, the stage with the least headroom is shown.
 */
export function headroomGroups(loop: LoopDesign, { oscillator, esN0Db }: HeadroomContext): BitsGroup[] {
  const tightest = worstOfEachNode(loop.headroom);
  const before = tightest.filter(({ node }) => ahead.includes(node));
  const behind = tightest.filter(({ node }) => !ahead.includes(node));
  const top = Math.max(0, ...behind.map(bitsAboveGuard));
  const label = (node: HeadroomNode) => labelOf(node, loop, esN0Db);
  const groups = [
    { heading: 'Detector units', rows: before.map((node) => bitsRow(node, label(node), 0)), axis: [] },
    {
      heading: `${oscillator} units, weights in line`,
      rows: behind.map((node) => bitsRow(node, label(node), top - bitsAboveGuard(node))),
      axis: weights(top, Math.max(0, ...behind.map(guardOf)), loop.resolutionHz),
    },
  ];
  return groups.filter(({ rows }) => rows.length > 0);
}

/** The node and the signal that reaches it: “Error, 4σ at 10 dB”, “Integrator at ±77.5 kHz”, “Proportional, track”. */
function labelOf({ node, stage }: HeadroomNode, { acquisition }: LoopDesign, esN0Db: number): string {
  if (stage) return `${names[node]}, ${stage}`;
  if (ahead.includes(node)) return `${names[node]}, 4σ at ${numberText(esN0Db)} dB`;
  const { offsetHz, offsetPpm } = acquisition;
  if (node !== 'integrator') return names[node];
  if (offsetHz) return `${names[node]} at ±${quantityText(offsetHz, { unit: 'Hz', significant: 4 })}`;
  return !offsetPpm ? names[node] : `${names[node]} at ±${numberText(offsetPpm)} ppm`;
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

const bitsRow = (node: HeadroomNode, label: string, offset: number): BitsRow => ({
  ...{ label, bits: node.widthBits, reached: node.reachedBits, guard: guardOf(node), offset },
  ...{ overflow: node.headroomBits < 0, headroom: node.headroomBits, note: `${node.widthBits} bits` },
});

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
