import { numberText } from '../../../shared/quantities/format';
import type { CompleteCheck, Replay, ReplayState, ReplaySummary, Verdict } from '../../api/replays';
import { digestText } from '../../date-text';
import type { State } from '../states';
import { offsetsOf } from './check-points';
import { offsetScale, type OffsetScale } from './offset-scale';

const verdictWords: Record<Verdict, string> = {
  pass: 'Locks over the whole range',
  fail: 'Does not lock everywhere',
  undecided: 'Not enough trials to say',
};

const stateWords: Record<ReplayState, string> = {
  queued: 'Waiting for a worker',
  running: 'Running',
  done: 'Done',
  failed: 'Stopped by an error',
  cancelled: 'Cancelled',
};

/** Shape and words of what is known of a replay; undecided and cancelled are never a pass in disguise. */
export function replayStanding({ state, verdict }: Pick<ReplaySummary, 'state' | 'verdict'>): {
  state: State;
  label: string;
} {
  if (state === 'done' && verdict) return { state: verdict, label: verdictWords[verdict] };
  if (state === 'failed') return { state: 'fail', label: stateWords.failed };
  return { state: state === 'running' ? 'running' : 'none', label: stateWords[state] };
}

export const scaleOf = (check: CompleteCheck): OffsetScale => offsetScale(offsetsOf(check));

/** “41, ±155 kHz”, “21, +10 to +20 kHz”. */
export function offsetsText(check: CompleteCheck): string {
  const { start, stop, points } = check.carrierOffsetHz;
  const ends = offsetScale([start, stop]);
  const bare = (hertz: number) => numberText(Math.abs(ends.of(hertz)), { decimals: ends.decimals });
  if (points < 2) return `1, ${ends.text(start)} ${ends.unit}`;
  const range = start === -stop ? `±${bare(stop)}` : `${ends.text(start)} to ${ends.text(stop)}`;
  return `${points}, ${range} ${ends.unit}`;
}

export const esN0Text = (check: CompleteCheck): string => {
  const values = check.esN0Db.map((value) => numberText(value));
  const last = values.pop() ?? '';
  return `${values.length > 0 ? `${values.join(', ')} and ` : ''}${last} dB`;
};

export const percentText = (share: number): string => `${numberText(100 * share, { significant: 4 })} %`;

export const limitText = ({ limits }: CompleteCheck): string =>
  `locked, min ${numberText(limits.lockProbability)} at ${percentText(limits.confidence)}`;

/** The strip under the title of a replay. */
export function replayCells(replay: Replay) {
  const { check } = replay;
  return [
    { label: 'Offsets', value: offsetsText(check) },
    { label: 'Es/N0', value: esN0Text(check) },
    { label: 'Trials', value: `${numberText(check.trials)} a point` },
    { label: 'Symbols', value: numberText(check.symbols) },
    { label: 'Seed', value: String(check.seed), mono: true },
    { label: 'Limit', value: limitText(check) },
    { label: 'Engine', value: replay.engine, mono: true },
    ...(replay.digest ? [{ label: 'Digest', value: digestText(replay.digest), mono: true }] : []),
  ];
}
