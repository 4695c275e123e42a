import type { ReplayPoint } from '../../../shared/model/replay-point';
import type { Replay } from '../../api/replays';

const weight = { fail: 2, undecided: 1, pass: 0 } as const;

/** The point that says most: where lock begins to fail, else where it begins to be undecided, else the farthest offset. */
export function firstToRead(replay: Replay | undefined): ReplayPoint | undefined {
  const points = [...(replay?.points ?? [])];
  points.sort((a, b) => weight[b.verdict] - weight[a.verdict] || Math.abs(a.offsetHz) - Math.abs(b.offsetHz));
  return points[0]?.verdict === 'pass' ? points.at(-1) : points[0];
}
