import type { ReplayPoint } from '../../../shared/model/replay-point';
import { replayCheck } from '../../../shared/replay/job';
import type { CompleteCheck } from '../../api/replays';

/** One point that a check asks for, with its result once there is one. */
export interface CheckPoint {
  index: number;
  offsetHz: number;
  esN0Db: number;
  result: ReplayPoint | undefined;
}

/** Offsets of a check, as the simulator spaces them. */
export const offsetsOf = (check: CompleteCheck): number[] => replayCheck(check).offsetsHz;

/** Every point of a check for one Es/N0, by rising offset. A result is found by its index, as the server numbers them. */
export function pointsAt(check: CompleteCheck, esN0Db: number, results: readonly ReplayPoint[]): CheckPoint[] {
  const offsets = offsetsOf(check);
  const first = check.esN0Db.indexOf(esN0Db) * offsets.length;
  const byIndex = new Map(results.map((result) => [result.index, result]));
  return offsets
    .map((offsetHz, place) => ({ index: first + place, offsetHz, esN0Db, result: byIndex.get(first + place) }))
    .sort((a, b) => a.offsetHz - b.offsetHz);
}

/** The points worth reading first: where the verdict changes from one offset to the next, both ends and the middle. */
export function notablePoints(points: readonly CheckPoint[]): CheckPoint[] {
  const verdict = (place: number) => points[place]?.result?.verdict;
  const parted = (place: number, other: number) => points[other] !== undefined && verdict(place) !== verdict(other);
  const fixed = [0, Math.floor((points.length - 1) / 2), points.length - 1];
  return points.filter(
    ({ result }, place) => result && (fixed.includes(place) || parted(place, place - 1) || parted(place, place + 1)),
  );
}
