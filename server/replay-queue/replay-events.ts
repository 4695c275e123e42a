import { EventEmitter } from 'node:events';
import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ReplaySummary } from '../repositories/replay-rows';

/** What followers of a replay are told: its state, a finished point with its place in the order, or that the server ends. */
export type ReplayEvent =
  { type: 'state'; replay: ReplaySummary } | { type: 'point'; sequence: number; point: ReplayPoint } | { type: 'end' };

export type ReplayListener = (event: ReplayEvent) => void;

/** Carries news of replays from where they are worked off to the streams of those who watch. */
export class ReplayEvents {
  private readonly emitter = new EventEmitter().setMaxListeners(0);

  publish(id: number, event: ReplayEvent): void {
    this.emitter.emit(String(id), event);
  }

  /** @returns stops listening */
  subscribe(id: number, listener: ReplayListener): () => void {
    this.emitter.on(String(id), listener);
    return () => void this.emitter.off(String(id), listener);
  }

  /** Ends every stream. */
  end(): void {
    for (const id of this.emitter.eventNames()) this.emitter.emit(id, { type: 'end' });
  }
}
