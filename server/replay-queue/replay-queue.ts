import type { ReplayJob } from '../../shared/replay/job';
import type { ReplayTrace } from '../../shared/replay/trace';
import type { ReplayPoint } from '../../shared/model/replay-point';

/** A replay that was taken from the queue, with what is left to do of it. */
export interface TakenReplay {
  id: number;
  job: ReplayJob;
  /** Indices of the points that are not stored yet, in order. */
  remaining: number[];
}

/** Where a queue finds its work and leaves what comes of it. */
export interface ReplayStore {
  /** Puts back what was running when the server ended without a word. */
  recover(): Promise<void>;
  /** Marks the oldest queued replay as running; undefined when none is queued. */
  take(): Promise<TakenReplay | undefined>;
  /** False when the replay does not run any more: the rest of its points is not wanted. */
  append(id: number, point: ReplayPoint): Promise<boolean>;
  /** All points are stored: works out verdict and digest. */
  finish(id: number): Promise<void>;
  fail(id: number, error: unknown): Promise<void>;
  putBack(id: number): Promise<void>;
}

/** Works replays off, away from the requests. */
export interface ReplayQueue {
  /** Recovers what a crash left and begins to work. */
  start(): Promise<void>;
  /** Something was queued. */
  wake(): void;
  /** Stops the work on a replay whose state says so already. */
  cancel(id: number): void;
  /** Works one trial out again from its seed. */
  trace(job: ReplayJob, point: number, trial: number): Promise<ReplayTrace>;
  /** Ends the work; a running replay is put back and goes on at its next point after the next start. */
  stop(): Promise<void>;
}
