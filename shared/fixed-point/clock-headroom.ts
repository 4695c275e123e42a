import type { HeadroomNode } from '../model/design';
import type { ClockWords } from '../model/words';
import { toNumber } from './format';
import { gainOf } from './gain-words';

/**
 * Largest clock error ± that the integrator holds: Lim/(step0·2^G) with hold, an N-th of it without; no more than the
 * counter itself can step, ppm. 0 for order 1, which has no integrator, and for 1 sample per symbol: a counter that
 * strobes at every sample cannot strobe faster.
 */
export function largestErrorHeldPpm(words: ClockWords, samplesPerSymbol: number): number {
  if (words.order === 1) return 0;
  const most = words.integratorLimit === null ? 2 ** (words.integratorBits - 1) - 1 : toNumber(words.integratorLimit);
  const nominal = toNumber(words.counter.nominalStep);
  // A step is 1 to 2^Wc − 1.
  const room = Math.max(Math.min(nominal - 1, 2 ** words.counter.widthBits - 1 - nominal), 0);
  const control = Math.min(most / 2 ** words.guardBits, room);
  return ((words.hold ? control : control / samplesPerSymbol) / nominal) * 1e6;
}

/** Change of the symbol rate by one counter LSB, Hz. */
export function rateResolutionHz(
  { counter, hold }: ClockWords,
  { symbolRateBd, samplesPerSymbol }: { symbolRateBd: number; samplesPerSymbol: number },
): number {
  return (symbolRateBd * (hold ? samplesPerSymbol : 1)) / 2 ** counter.widthBits;
}

export interface ClockHeadroomInput {
  words: ClockWords;
  stageNames: readonly string[];
  /** Clock error that both ends make together, ppm. */
  offsetPpm: number;
  samplesPerSymbol: number;
}

/**
 * Headroom of the nodes of a clock loop behind its error word, for a full-scale error and the largest clock error.
 * What a Gardner detector reaches of its error word is not worked out.
 */
export function clockHeadroom(input: ClockHeadroomInput): HeadroomNode[] {
  const { words } = input;
  const error = 2 ** (words.errorBits - 1);
  const stages = words.stages.map((stage, i) => ({ stage, name: input.stageNames[i] ?? null }));
  const proportional = stages.map(({ stage, name }) =>
    pathNode(
      'proportional',
      { stage: name, widthBits: words.counter.widthBits, guardBits: 0 },
      gainOf(stage.proportional) * error,
    ),
  );
  if (words.order === 1) return proportional;
  const { integratorBits, guardBits } = words;
  const increments = stages.map(({ stage, name }) =>
    pathNode('increment', { stage: name, widthBits: integratorBits, guardBits }, gainOf(stage.integral) * error),
  );
  return [...proportional, ...increments, integratorNode(input)];
}

type Place = Pick<HeadroomNode, 'stage' | 'widthBits' | 'guardBits'>;

function pathNode(node: HeadroomNode['node'], place: Place, reached: number): HeadroomNode {
  const reachedBits = Math.log2(Math.max(Math.abs(reached), 1));
  return nodeOf(node, place, {
    reachedBits,
    worstBits: reachedBits,
    range: 2 ** (place.widthBits - 1),
    signal: 'full-scale error',
  });
}

/** A clock error of ε needs ε·step0 of every sample with hold, N times that at one sample a symbol without. */
function integratorNode({ words, offsetPpm, samplesPerSymbol }: ClockHeadroomInput): HeadroomNode {
  const { integratorBits: widthBits, guardBits } = words;
  const perSample = offsetPpm * 1e-6 * toNumber(words.counter.nominalStep) * 2 ** guardBits;
  const reached = words.hold ? perSample : perSample * samplesPerSymbol;
  const range = words.integratorLimit === null ? 2 ** (widthBits - 1) : Math.max(toNumber(words.integratorLimit), 1);
  const extremes = { reachedBits: Math.log2(Math.max(reached, 1)), worstBits: Math.log2(range), range };
  return nodeOf(
    'integrator',
    { stage: null, widthBits, guardBits },
    { ...extremes, signal: `clock error of ${Number(offsetPpm.toPrecision(6))} ppm` },
  );
}

function nodeOf(
  node: HeadroomNode['node'],
  place: Place,
  { reachedBits, worstBits, range, signal }: { reachedBits: number; worstBits: number; range: number; signal: string },
): HeadroomNode {
  const headroomBits = Math.log2(range) - reachedBits;
  const headroomDb = 20 * Math.log10(2) * headroomBits;
  return { node, ...place, reachedBits, headroomBits, headroomDb, worstBits, signal, fullScaleHz: null };
}
