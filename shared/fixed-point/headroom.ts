import type { HeadroomNode } from '../model/design';
import type { CarrierWords, StageGainWords } from '../model/words';
import { detectorExtremes } from './detector-extremes';
import { numberText } from '../quantities/format';
import { toBigInt, toNumber } from './format';
import { gainOf } from './gain-words';
import { errorLsb } from './loop-scale';
import { sampleLsbLog2 } from './tables';

export interface HeadroomInput {
  words: CarrierWords;
  symbolRateBd: number;
  /** Amplitude A of the symbols, sample units, above 0. */
  amplitude: number;
  /** Largest magnitude of a sample without noise over A: 1 for PSK. */
  peak: number;
  /** Es/N0 of the signal, dB. */
  esN0Db: number;
  /** Largest carrier offset that the integrator has to hold, ± Hz, 0 or more. */
  largestOffsetHz: number;
  /** Names of the stages, in the order of the words. */
  stageNames: readonly string[];
}

type Node = HeadroomNode['node'];

/** Clock fn of the NCO, Hz. */
export const ncoClockHz = (words: CarrierWords, symbolRateBd: number): number =>
  words.nco.stepsPerSymbol * symbolRateBd;

/** Frequency of one NCO LSB, fn/2^Wn, Hz. */
export const frequencyResolutionHz = (words: CarrierWords, symbolRateBd: number): number =>
  ncoClockHz(words, symbolRateBd) / 2 ** words.nco.widthBits;

/** Largest carrier offset that the integrator holds, Lim·fn/2^(Wn+G), Hz; 0 for order 1, which has none. */
export function largestOffsetHeldHz(words: CarrierWords, symbolRateBd: number): number {
  if (words.order === 1) return 0;
  const resolution = frequencyResolutionHz(words, symbolRateBd) * 2 ** -words.guardBits;
  const most = words.integratorLimit === null ? 2 ** (words.integratorBits - 1) - 1 : toNumber(words.integratorLimit);
  return most * resolution;
}

/**
 * Headroom of every node of a carrier loop for a signal of the given amplitude with four standard deviations of
 * noise, the largest offset in the integrator, and the widest stage.
 *
 * `reachedBits` is log2 of the magnitude that signal reaches in LSB of the node, `worstBits` that of the largest
 * magnitude that can arrive before the node is fitted; headroom = width − 1 − reached, below 0 where it overflows.
 */
export function carrierHeadroom(input: HeadroomInput): HeadroomNode[] {
  const { words } = input;
  const samples = sampleNode(input);
  const error = errorNode(input);
  const stages = words.stages.map((stage, index) => ({ stage, name: input.stageNames[index] ?? null }));
  const reach = Math.min(2 ** error.reachedBits, 2 ** (words.errorBits - 1));
  const proportional = stages.map(({ stage, name }) => proportionalNode(input, stage, name, reach));
  if (words.order === 1) return [samples, error, ...proportional, frequencyNode(input, proportional, 0)];
  const increments = stages.map(({ stage, name }) => incrementNode(input, stage, name, reach));
  const integrator = integratorNode(input);
  const held = 2 ** (integrator.reachedBits - words.guardBits);
  return [samples, error, ...proportional, ...increments, integrator, frequencyNode(input, proportional, held)];
}

function sampleNode(input: HeadroomInput): HeadroomNode {
  const { words, amplitude, peak } = input;
  const lsb = 2 ** sampleLsbLog2(words);
  const reached = (amplitude * peak + 4 * railNoise(input)) / lsb;
  // The rotator can turn both rails of a full-scale sample into one.
  const worst = Math.SQRT2 * 2 ** (words.sampleBits - 1);
  return node('sample', words.sampleBits, { reached, worst, signal: noisySignal(input) });
}

function errorNode(input: HeadroomInput): HeadroomNode {
  const { words } = input;
  const { reached, worst } = detectorExtremes({ ...input, railNoise: railNoise(input) });
  const lsb = errorLsb(words);
  return node('error', words.errorBits, { reached: reached / lsb, worst: worst / lsb, signal: noisySignal(input) });
}

function proportionalNode(input: HeadroomInput, { proportional }: StageGainWords, stage: string | null, reach: number) {
  const { words, symbolRateBd } = input;
  const gain = Math.abs(gainOf(proportional));
  return node('proportional', words.nco.widthBits, {
    reached: gain * reach,
    worst: gain * 2 ** (words.errorBits - 1),
    signal: 'largest error',
    stage,
    lsbHz: frequencyResolutionHz(words, symbolRateBd),
  });
}

function incrementNode(input: HeadroomInput, { integral }: StageGainWords, stage: string | null, reach: number) {
  const { words, symbolRateBd } = input;
  const gain = Math.abs(gainOf(integral));
  return node('increment', words.integratorBits, {
    reached: gain * reach,
    worst: gain * 2 ** (words.errorBits - 1),
    signal: 'largest error',
    stage,
    guardBits: words.guardBits,
    lsbHz: frequencyResolutionHz(words, symbolRateBd) * 2 ** -words.guardBits,
  });
}

/** What an integrator spans: its limit where it has one, else its word. */
const integratorRange = ({ integratorLimit, integratorBits }: CarrierWords): number =>
  integratorLimit === null ? 2 ** (integratorBits - 1) : toNumber(integratorLimit);

function integratorNode({ words, symbolRateBd, largestOffsetHz }: HeadroomInput): HeadroomNode {
  const lsbHz = frequencyResolutionHz(words, symbolRateBd) * 2 ** -words.guardBits;
  const range = integratorRange(words);
  const largest = Math.max(
    ...words.stages.map(({ integral }) => Math.abs(gainOf(integral)) * 2 ** (words.errorBits - 1)),
  );
  return node('integrator', words.integratorBits, {
    reached: largestOffsetHz / lsbHz,
    worst: range + largest,
    signal: `carrier offset of ${decimal(largestOffsetHz)} Hz`,
    guardBits: words.guardBits,
    lsbHz,
    range,
  });
}

function frequencyNode(input: HeadroomInput, proportional: HeadroomNode[], held: number): HeadroomNode {
  const { words, symbolRateBd } = input;
  const centre = Number(BigInt.asIntN(words.nco.widthBits, toBigInt(words.nco.fcw)));
  const largest = (bits: 'reachedBits' | 'worstBits') => Math.max(...proportional.map((each) => 2 ** each[bits]));
  const holdable = words.order === 1 ? 0 : integratorRange(words) * 2 ** -words.guardBits;
  return node('frequency-word', words.nco.widthBits, {
    reached: Math.abs(centre) + held + largest('reachedBits'),
    worst: Math.abs(centre) + holdable + largest('worstBits'),
    signal: 'sum of centre frequency, offset and largest error',
    lsbHz: frequencyResolutionHz(words, symbolRateBd),
  });
}

interface Extremes {
  reached: number;
  worst: number;
  signal: string;
  stage?: string | null;
  guardBits?: number;
  lsbHz?: number;
  range?: number;
}

function node(name: Node, widthBits: number, extremes: Extremes): HeadroomNode {
  const { reached, worst, signal, stage = null, guardBits = 0, lsbHz, range = 2 ** (widthBits - 1) } = extremes;
  // Less than one LSB cannot be told from one LSB in a headroom.
  const reachedBits = Math.log2(Math.max(reached, 1));
  const headroomBits = Math.log2(range) - reachedBits;
  return {
    node: name,
    stage,
    widthBits,
    guardBits,
    reachedBits,
    headroomBits,
    headroomDb: 20 * Math.log10(2) * headroomBits,
    worstBits: Math.log2(Math.max(worst, 1)),
    signal,
    fullScaleHz: lsbHz === undefined ? null : range * lsbHz,
  };
}

/** Noise of one rail, A/√(2γ), sample units. */
const railNoise = ({ amplitude, esN0Db }: HeadroomInput): number => amplitude / Math.sqrt(2 * 10 ** (esN0Db / 10));

const noisySignal = ({ amplitude, esN0Db }: HeadroomInput): string =>
  `amplitude ${decimal(amplitude)} with 4σ of noise at ${decimal(esN0Db)} dB`;

const decimal = (value: number): string => numberText(value, { significant: 6 });
