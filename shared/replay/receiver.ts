import { carrierRunner } from '../fixed-point/datapath/carrier-runner';
import { carrierNodes, type CarrierNodes } from '../fixed-point/datapath/carrier-nodes';
import { toNumber } from '../fixed-point/format';
import { symmetry, type Modulation } from '../fixed-point/symmetry';
import { channel } from './channel';
import { pointAt, type ReplayJob } from './job';
import { PhaseWatch } from './phase-watch';
import { TrialRandom } from './random';
import { symbolSource } from './source';

/** Symbols that are worked out together. */
const blockSymbols = 256;

/** What a block of a trial showed, for whoever looks on. */
export interface BlockView {
  nodes: CarrierNodes;
  /** Symbols in this block. */
  count: number;
  /** Phase error before each symbol's update, periods of 1/M turn. */
  errors: Float64Array;
}

export const powerOf = ({ modulation }: Pick<ReplayJob, 'modulation'>): number =>
  symmetry(modulation.toLowerCase() as Modulation).power;

/**
 * Runs one trial: random symbols and a random first phase through the channel and the bit-true datapath.
 *
 * @param look called after every block; its arrays are used again for the next
 * @returns the watch over the true phase error, at the trial's end
 */
export function runTrial(
  job: ReplayJob,
  pointIndex: number,
  trial: number,
  look: (block: BlockView) => void,
): PhaseWatch {
  const { words, tables, check } = job;
  const { offsetHz, esN0Db } = pointAt(job, pointIndex);
  const random = new TrialRandom({ seed: check.seed, point: pointIndex, trial });
  const source = symbolSource(job.modulation.toLowerCase(), words.ringRatios);
  const firstTurns = random.fraction();
  const offsetTurns = offsetHz / job.symbolRateBd;
  const centreTurns = (words.nco.stepsPerSymbol * toNumber(words.nco.fcw)) / 2 ** words.nco.widthBits;
  const turnsPerSymbol = centreTurns - Math.floor(centreTurns) + offsetTurns;
  const line = channel({ words, source, amplitude: job.amplitude, esN0Db, turnsPerSymbol, firstTurns });
  const runner = carrierRunner(words, tables);
  const watch = new PhaseWatch({
    power: powerOf(job),
    turnsPerSymbol: offsetTurns,
    // The NCO's word is 0 until the first update: it stands still for U − 1 symbols while the carrier turns.
    firstTurns: firstTurns + centreTurns * (words.symbolsPerUpdate - 1),
    turnsPerLsb: 2 ** -words.nco.widthBits,
    symbols: check.symbols,
  });

  const indices = new Uint8Array(blockSymbols);
  const xI = new Int32Array(blockSymbols);
  const xQ = new Int32Array(blockSymbols);
  const errors = new Float64Array(blockSymbols);
  const nodes = carrierNodes(blockSymbols);
  for (let done = 0; done < check.symbols; done += blockSymbols) {
    const count = Math.min(blockSymbols, check.symbols - done);
    source.draw(random, count, indices);
    line.pass(random, indices, count, xI, xQ);
    runner.run(xI, xQ, indices, count, nodes);
    watch.add(nodes.advance, count, errors);
    look({ nodes, count, errors });
  }
  return watch;
}
