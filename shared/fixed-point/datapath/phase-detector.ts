import type { CarrierWords } from '../../model/words';
import { ParameterError } from '../../parameter-error';
import { sampleLsbLog2, type DecisionTable } from '../tables';

/** A rotated sample as exact integers, [in-phase, quadrature]. */
export type ExactSample = readonly [bigint, bigint];

/** Exact detector value X of one symbol; `half` is the sample half a symbol later, `known` the index of the symbol sent. */
export type PhaseDetector = (z: ExactSample, half: ExactSample, known: number) => bigint;

const sgn = (value: bigint): bigint => (value < 0n ? -1n : 1n);

/** Bits to which the power law cuts each rail, so that u^M stays inside 64 bits. */
const powerLawBits = { 2: 24, 4: 13, 8: 7 } as const;

/** Right shift t of each rail before the power law. */
export const powerLawShift = ({ sampleBits, power }: CarrierWords): number =>
  Math.max(0, sampleBits - powerLawBits[power!]);

/** log2 of one LSB of the detector value X, in detector units. */
export function detectorLsbLog2(words: CarrierWords): number {
  const lz = sampleLsbLog2(words);
  switch (words.detector) {
    case 'costas':
      return 2 * lz;
    case 'sign':
      return lz;
    case 'power-law':
      return words.power! * (lz + powerLawShift(words));
    default:
      return lz - (words.tableBits - 2);
  }
}

/** The detector that the words ask for. @throws {ParameterError} when there is none for the modulation */
export function phaseDetector(words: CarrierWords, decision?: DecisionTable): PhaseDetector {
  if (words.detector === 'costas') return ([i, q]) => i * q;
  if (words.detector === 'sign') return signDetector(words.modulation);
  if (words.detector === 'power-law') return powerLaw(words);
  return pointDetector(words.detector === 'known-symbols', decision);
}

function signDetector(modulation: CarrierWords['modulation']): PhaseDetector {
  if (modulation === 'bpsk') return ([i, q]) => sgn(i) * q;
  if (modulation === 'qpsk') return ([i, q]) => sgn(i) * q - sgn(q) * i;
  if (modulation === 'oqpsk') return ([i, q], [halfI, halfQ]) => sgn(i) * q - sgn(halfQ) * halfI;
  throw new ParameterError('modulation', 'the sign detector serves BPSK, QPSK and OQPSK');
}

function powerLaw(words: CarrierWords): PhaseDetector {
  const shift = BigInt(powerLawShift(words));
  const sign = BigInt(words.powerSign!);
  return ([i, q]) => sign * raise([i >> shift, q >> shift], words.power!)[1];
}

/** u^M for M a power of two, by squaring. */
export function raise(u: ExactSample, power: number): ExactSample {
  let [re, im] = u;
  for (let done = 1; done < power; done *= 2) [re, im] = [re * re - im * im, 2n * re * im];
  return [re, im];
}

function pointDetector(known: boolean, decision?: DecisionTable): PhaseDetector {
  if (!decision) throw new ParameterError('tables', 'this detector needs its decision table');
  const exact = (pairs: [number, number][]) => pairs.map(([i, q]) => [BigInt(i), BigInt(q)] as const);
  const references = exact(decision.references);
  const received = exact(decision.received);
  return ([i, q], _half, symbol) => {
    const [aI, aQ] = references[known ? symbol : nearestPoint([i, q], received)]!;
    return q * aI - i * aQ;
  };
}

function nearestPoint([i, q]: ExactSample, points: readonly ExactSample[]): number {
  let least = -1n;
  let index = 0;
  points.forEach(([pI, pQ], k) => {
    const distance = (i - pI) ** 2n + (q - pQ) ** 2n;
    if (least < 0n || distance < least) [least, index] = [distance, k];
  });
  return index;
}
