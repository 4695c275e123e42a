import type { CompleteCheck, ReplaySummary } from '../../api/replays';

/** What a replay computes, without the name it was given. */
const computed = ({ carrierOffsetHz, esN0Db, symbols, trials, seed, limits }: CompleteCheck): string =>
  JSON.stringify([
    [carrierOffsetHz.start, carrierOffsetHz.stop, carrierOffsetHz.points],
    esN0Db,
    [symbols, trials, seed],
    [limits.lockProbability, limits.confidence],
  ]);

/** True when two replays ran the same check on the same revision: their digests must then be equal. */
export const sameCheck = (one: ReplaySummary, other: ReplaySummary): boolean =>
  one.revision.id === other.revision.id && computed(one.check) === computed(other.check);
