import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ToleranceCheck } from '../../shared/model/tolerance-check';
import { api, events } from './client';
import { page, type Page } from './pages';
import type { PersonName } from './plans';

export type ReplayState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled';
export type Verdict = 'pass' | 'fail' | 'undecided';

/** A check as the server keeps it: every default filled in. */
export type CompleteCheck = Required<ToleranceCheck> & {
  carrierOffsetHz: Required<ToleranceCheck['carrierOffsetHz']>;
  limits: Required<NonNullable<ToleranceCheck['limits']>>;
};

export interface ReplaySummary {
  id: number;
  revision: { id: number; number: number; plan: { id: number; name: string }; target: { slug: string; name: string } };
  check: CompleteCheck;
  state: ReplayState;
  by: PersonName;
  createdAt: string;
  startedAt: string | null;
  finishedAt: string | null;
  pointsDone: number;
  pointsTotal: number;
  verdict: Verdict | null;
  /** SHA-256 of the finished replay, hex; the same check on the same revision gives the same. */
  digest: string | null;
  engine: string;
  error: string | null;
}

export interface Replay extends ReplaySummary {
  points: ReplayPoint[];
}

export interface ReplayTrace {
  symbols: number;
  decimation: number;
  /** One value for each kept symbol, like the arrays below. */
  symbol: number[];
  phaseErrorDeg: number[];
  frequencyHz: number[];
  integratorHz: number[];
  stage: number[];
  lockedAtSymbol: number | null;
  outcome: 'locked' | 'false-lock' | 'unlocked';
  /** [I, Q] in units of the amplitude: the first samples of the trial and the last. */
  constellation: { before: [number, number][]; after: [number, number][] };
}

export type ReplayEvent = { type: 'state'; replay: ReplaySummary } | { type: 'point'; point: ReplayPoint };

export const createReplay = (revisionId: number, check: ToleranceCheck): Promise<Replay> =>
  api.post<Replay>('/replays', { revisionId, check });

export const listReplays = (cursor: string | null = null, limit = 50): Promise<Page<ReplaySummary>> =>
  page<ReplaySummary>('/replays', cursor, limit);

export const listReplaysOf = (revisionId: number): Promise<Page<ReplaySummary>> =>
  page<ReplaySummary>(`/replays?revisionId=${revisionId}`);

export const getReplay = (id: number, signal?: AbortSignal): Promise<Replay> =>
  api.get<Replay>(`/replays/${id}`, { signal });

export const cancelReplay = (id: number): Promise<unknown> => api.post(`/replays/${id}/cancel`);

export const getTrace = (id: number, point: number, trial: number, signal?: AbortSignal): Promise<ReplayTrace> =>
  api.get<ReplayTrace>(`/replays/${id}/trace?point=${point}&trial=${trial}`, { signal });

export const finished = (state: ReplayState): boolean => state !== 'queued' && state !== 'running';

export interface FollowOptions {
  signal: AbortSignal;
  /** Called whenever the connection is lost; it is then opened again by itself. */
  onLost: () => void;
}

/** Follows a replay until it is finished or the signal aborts. */
export function followReplay(id: number, onEvent: (event: ReplayEvent) => void, options: FollowOptions): Promise<void> {
  return events(
    `/replays/${id}/events`,
    ({ type, data }) => {
      if (type === 'state') onEvent({ type, replay: data as ReplaySummary });
      if (type === 'point') onEvent({ type, point: data as ReplayPoint });
      return !(type === 'state' && finished((data as ReplaySummary).state));
    },
    options,
  );
}
