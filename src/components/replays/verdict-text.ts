import type { ReplayPoint } from '../../../shared/model/replay-point';
import type { Replay } from '../../api/replays';
import { numberText } from '../../../shared/quantities/format';
import { pointsAt, type CheckPoint } from './check-points';
import type { OffsetScale } from './offset-scale';

const said = { pass: 'proved', fail: 'refuted', undecided: 'undecided' } as const;

type Run = { verdict: ReplayPoint['verdict']; from: number; to: number };

/** What is known so far, in one sentence for each Es/N0: where lock is proved, refuted and undecided, what has yet to run. */
export function verdictText(replay: Replay, scale: OffsetScale): string {
  return replay.check.esN0Db
    .map((esN0Db) => `${numberText(esN0Db)} dB: ${soFar(pointsAt(replay.check, esN0Db, replay.points), scale)}.`)
    .join(' ');
}

function soFar(points: readonly CheckPoint[], scale: OffsetScale): string {
  const runs = runsOf(points);
  const parts = (['pass', 'undecided', 'fail'] as const).flatMap((verdict) => {
    const own = runs.filter((run) => run.verdict === verdict);
    return own.length === 0 ? [] : [`${said[verdict]} ${placesText(own, scale)}`];
  });
  const open = points.filter(({ result }) => !result).length;
  return [...parts, ...(open > 0 ? [`${open} of ${points.length} offsets not run`] : [])].join(', ');
}

/** Neighbours of one verdict together; a point that has not run parts them. */
function runsOf(points: readonly CheckPoint[]): Run[] {
  const runs: Run[] = [];
  points.forEach(({ result, offsetHz }, place) => {
    if (!result) return;
    const before = points[place - 1]?.result?.verdict;
    const last = runs.at(-1);
    if (last && before === result.verdict) last.to = offsetHz;
    else runs.push({ verdict: result.verdict, from: offsetHz, to: offsetHz });
  });
  return runs;
}

const mostPlaces = 3;

function placesText(runs: readonly Run[], scale: OffsetScale): string {
  const first = runs[0];
  const last = runs.at(-1);
  if (!first || !last) return '';
  const between = { from: first.from, to: last.to };
  const places =
    runs.length > mostPlaces
      ? `at places between ${scale.text(between.from)} and ${scale.text(between.to)}`
      : runs.map((run) => placeText(run, scale)).join(' and ');
  return `${places} ${scale.unit}`;
}

const placeText = ({ from, to }: Pick<Run, 'from' | 'to'>, scale: OffsetScale): string =>
  from === to ? `at ${scale.text(from)}` : `from ${scale.text(from)} to ${scale.text(to)}`;

/** How it stands inside the range that the plan asks for, where a check goes beyond it; undefined elsewhere. */
export function requiredText({ check, points }: Replay, requiredHz: number, scale: OffsetScale): string | undefined {
  const { start, stop } = check.carrierOffsetHz;
  if (requiredHz === 0 || Math.max(Math.abs(start), Math.abs(stop)) <= requiredHz) return undefined;
  const inside = points.filter(({ offsetHz }) => Math.abs(offsetHz) <= requiredHz);
  const counts = (['pass', 'undecided', 'fail'] as const)
    .map((verdict) => ({ verdict, count: inside.filter((point) => point.verdict === verdict).length }))
    .filter(({ count }) => count > 0)
    .map(({ verdict, count }) => `${count === inside.length ? 'all ' : ''}${numberText(count)} ${said[verdict]}`);
  if (counts.length === 0) return undefined;
  return `Inside the required ±${numberText(scale.of(requiredHz))} ${scale.unit}: ${counts.join(', ')}.`;
}

/** Says that trials held a wrong frequency or phase with a quiet error, which a lock detector alone would take for lock. */
export function falseLockText(points: readonly ReplayPoint[]): string | undefined {
  const hit = points.filter(({ falseLocks }) => falseLocks > 0);
  const trials = hit.reduce((sum, { falseLocks }) => sum + falseLocks, 0);
  if (trials === 0) return undefined;
  const those = trials === 1 ? '1 trial' : `${numberText(trials)} trials`;
  return `${those} at ${hit.length === 1 ? '1 point' : `${hit.length} points`} settled on a wrong frequency or phase: false lock.`;
}
