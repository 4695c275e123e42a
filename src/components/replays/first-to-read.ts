import type { ReplayPoint } from '../../../shared/model/replay-point';
import type { Replay } from '../../api/replays';

const weight = { fail: 2, undecided: 1, pass: 0 } as const;

/** The point that says most: one that fails, else an undecided one, else the farthest offset; of equals the farthest. */
export function firstToRead(replay: Replay | undefined): ReplayPoint | undefined {
  const points = [...(replay?.points ?? [])];
  points.sort((a, b) => weight[b.verdict] - weight[a.verdict] || Math.abs(b.offsetHz) - Math.abs(a.offsetHz));
  return points[0];
}
