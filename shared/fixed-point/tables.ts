import type { CarrierWords, Words } from '../model/words';
import { constellation } from './constellation';
import { rotatorTable, type RotatorTable } from './rotator-table';

/** Decision points as integers, pairs [in-phase, quadrature] in the order of the point list. */
export interface DecisionTable {
  /** â = a·2^(Wt−2): what the detector multiplies by. */
  references: [number, number][];
  /** r = A·a in sample LSB: what a sample is compared with. */
  received: [number, number][];
}

/** The integer tables beside a carrier loop's words; a revision keeps them and every replay starts from them. */
export interface CarrierTables extends RotatorTable {
  decision?: DecisionTable;
}

/** log2 of one sample LSB, lz = kz − (Wz − 1). */
export const sampleLsbLog2 = ({ sampleFullScaleLog2, sampleBits }: Words): number =>
  sampleFullScaleLog2 - (sampleBits - 1);

/** Works the tables of a carrier loop out; two libraries may differ in a last bit here, so they are kept. */
export function carrierTables(words: CarrierWords): CarrierTables {
  const table = rotatorTable({ phaseBits: words.nco.phaseBits, tableBits: words.tableBits });
  const decides = words.detector === 'decision' || words.detector === 'known-symbols';
  return decides ? { ...table, decision: decisionTable(words) } : table;
}

function decisionTable(words: CarrierWords): DecisionTable {
  const points = constellation(words.modulation!, words.ringRatios);
  const scaled = (scale: number) =>
    points.map(([i, q]): [number, number] => [awayFromZero(i * scale), awayFromZero(q * scale)]);
  return {
    references: scaled(2 ** (words.tableBits - 2)),
    received: scaled(words.amplitude! * 2 ** -sampleLsbLog2(words)),
  };
}

/** Nearest integer, a half away from 0. The sum turns −0 into 0. */
const awayFromZero = (value: number): number => Math.sign(value) * Math.floor(Math.abs(value) + 0.5) + 0;
