import { transponder17 } from '../../seeds/plans';
import { withDefaults } from '../../server/schemas';
import { workOut } from '../../shared/design';
import { carrierTables } from '../../shared/fixed-point/tables';
import type { CarrierWords } from '../../shared/model/words';
import { channel } from '../../shared/replay/channel';
import { replayCheck, type ReplayJob } from '../../shared/replay/job';
import { TrialRandom } from '../../shared/replay/random';
import { symbolSource } from '../../shared/replay/source';

/** The published satellite link of the demo, two stages and both loops. */
export const plan = withDefaults('plan', transponder17(0.004, 250_000));

const offsetHz = 60_000;
const esN0Db = 10;

/** One point of a replay of it. */
export function demoJob(symbols: number): ReplayJob {
  const words = workOut(structuredClone(plan)).carrier!.words as CarrierWords;
  const check = { name: 'Bench', carrierOffsetHz: { start: offsetHz, stop: offsetHz, points: 1 }, esN0Db: [esN0Db] };
  return {
    words,
    tables: carrierTables(words),
    symbolRateBd: plan.signal.symbolRateBd,
    modulation: plan.signal.modulation!,
    amplitude: plan.signal.amplitude!,
    check: replayCheck({ ...check, symbols, trials: 100 }),
  };
}

export interface Samples {
  xI: Int32Array;
  xQ: Int32Array;
}

/** Received samples of the point, as the replay's own channel makes them. */
export function samplesOf({ words, amplitude, symbolRateBd, modulation }: ReplayJob, count: number): Samples {
  const source = symbolSource(modulation.toLowerCase());
  const turnsPerSymbol = offsetHz / symbolRateBd;
  const line = channel({ words, source, amplitude, esN0Db, turnsPerSymbol, firstTurns: 0.1 });
  const random = new TrialRandom({ seed: 1, point: 0, trial: 0 });
  const indices = new Uint8Array(count);
  const samples = { xI: new Int32Array(count), xQ: new Int32Array(count) };
  source.draw(random, count, indices);
  line.pass(random, indices, count, samples.xI, samples.xQ);
  return samples;
}
