import { onScopeDispose, ref, shallowRef } from 'vue';
import type { ReplayPoint } from '../../shared/model/replay-point';
import { finished, followReplay, getReplay, type Replay, type ReplayEvent } from '../api/replays';
import { useAction } from './use-action';

/** One replay, kept up to date while it runs. A lost connection costs nothing: the server goes on and is asked again. */
export function useReplay(id: number) {
  const { error, run } = useAction();
  const replay = shallowRef<Replay>();
  const lost = ref(false);
  const leaving = new AbortController();
  onScopeDispose(() => leaving.abort());

  async function load(): Promise<void> {
    const read = await run(() => getReplay(id, leaving.signal));
    if (!read) return;
    replay.value = read;
    if (!finished(read.state)) await follow();
  }

  async function follow(): Promise<void> {
    await run(() => followReplay(id, apply, { signal: leaving.signal, onLost: () => (lost.value = true) }));
    lost.value = false;
  }

  function apply(event: ReplayEvent): void {
    lost.value = false;
    if (replay.value) replay.value = withEvent(replay.value, event);
  }

  return { replay, error, lost, load };
}

/** A replay after one event. A point that comes twice after a lost connection counts once. */
export function withEvent(replay: Replay, event: ReplayEvent): Replay {
  // A replay that another engine takes over begins again without points.
  if (event.type === 'state')
    return { ...replay, ...event.replay, points: event.replay.pointsDone > 0 ? replay.points : [] };
  const points = withPoint(replay.points, event.point);
  return { ...replay, points, pointsDone: Math.max(replay.pointsDone, points.length) };
}

const withPoint = (points: readonly ReplayPoint[], point: ReplayPoint): ReplayPoint[] =>
  [...points.filter(({ index }) => index !== point.index), point].sort((a, b) => a.index - b.index);
