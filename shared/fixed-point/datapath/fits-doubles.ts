import type { CarrierWords } from '../../model/words';
import type { CarrierTables } from '../tables';
import { detectorLsbLog2, powerLawShift } from './phase-detector';

export interface DoublesProof {
  /** Every exact value on the way to every node is an integer of at most 2^53. */
  fits: boolean;
  /** The first value that is not, where there is one. */
  reason?: string;
}

/** Integers up to this magnitude, and their sums up to it, are exact in a double. */
const exact = 2 ** 53;

/**
 * Proves from the widths alone that doubles hold the carrier datapath exactly. Each bound is the largest magnitude
 * of a value before it is rounded, the half that rounding adds included; left shifts only move the binary point,
 * which a double does exactly.
 */
export function fitsDoubles(words: CarrierWords, tables: CarrierTables): DoublesProof {
  if (words.detector === 'sign' && words.modulation === 'oqpsk') return { fits: false, reason: 'two samples a symbol' };
  for (const [reason, bound] of bounds(words, tables)) if (!(bound <= exact)) return { fits: false, reason };
  return { fits: true };
}

function bounds(words: CarrierWords, tables: CarrierTables): [string, number][] {
  const { nco, stages, order, symbolsPerUpdate } = words;
  const errorShift = words.errorFullScaleLog2 - (words.errorBits - 1) - detectorLsbLog2(words);
  const error = 2 ** (words.errorBits - 1);
  const product = (word: { mantissa: number; shift: number }) => error * Math.abs(word.mantissa) + half(word.shift);
  const integrator = 2 ** (words.integratorBits - 1);
  const output = 2 ** (nco.widthBits - 1) + integrator * 2 ** -words.guardBits;
  return [
    ['rotated sample', 2 ** (words.sampleBits - 1) * 2 ** (words.tableBits - 1) + half(words.tableBits - 2)],
    ['detector value', symbolsPerUpdate * detectorBound(words, tables) + half(errorShift)],
    ['decision distance', distanceBound(words, tables)],
    ['proportional product', Math.max(...stages.map((stage) => product(stage.proportional)))],
    ['integral product', order > 1 ? Math.max(...stages.map((stage) => product(stage.integral))) : 0],
    ['second integral product', order > 2 ? Math.max(...stages.map((stage) => product(stage.integral2))) : 0],
    ['integrator', order > 1 ? 2 * integrator : 0],
    ['second integrator', order > 2 ? 2 ** words.integrator2Bits : 0],
    ['second integrator into the first', order > 2 ? integrator + 2 ** (words.integrator2Bits - words.guard2Bits) : 0],
    ['frequency word', 2 ** nco.widthBits + output],
    ['phase', 2 ** nco.widthBits * (nco.stepsPerSymbol + 1)],
    ['lock statistic', stages.some(({ lockThreshold }) => lockThreshold !== null) ? lockBound(words) : 0],
  ];
}

const half = (shift: number): number => (shift > 0 ? 2 ** (shift - 1) : 0);

function detectorBound(words: CarrierWords, { decision }: CarrierTables): number {
  const rail = 2 ** (words.sampleBits - 1);
  if (words.detector === 'costas') return rail ** 2;
  if (words.detector === 'sign') return 2 * rail;
  if (words.detector === 'power-law') return (2 * (rail * 2 ** -powerLawShift(words)) ** 2) ** (words.power! / 2);
  return 2 * rail * largest(decision?.references);
}

function distanceBound(words: CarrierWords, { decision }: CarrierTables): number {
  if (words.detector !== 'decision') return 0;
  return 2 * (2 ** (words.sampleBits - 1) + largest(decision?.received)) ** 2;
}

const largest = (pairs: [number, number][] = []): number =>
  pairs.reduce((most, [i, q]) => Math.max(most, Math.abs(i), Math.abs(q)), 0);

/** T·den at its largest, T up to 2^8. */
function lockBound({ sampleBits, lock }: CarrierWords): number {
  const rail = 2 ** (Math.min(sampleBits, 7) - 1);
  return 256 * lock.averagingSymbols * (2 * rail ** 2) ** (lock.power / 2);
}
