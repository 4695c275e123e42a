import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ReplayJob } from '../../shared/replay/job';
import { runPoint } from '../../shared/replay/run-point';
import { traceTrial, type ReplayTrace } from '../../shared/replay/trace';

export interface PointTask {
  job: ReplayJob;
  index: number;
}

export interface TraceTask extends PointTask {
  trial: number;
}

// The names are those that worker-threads.ts asks for.
export const point = ({ job, index }: PointTask): ReplayPoint => runPoint(job, index);

export const trace = ({ job, index, trial }: TraceTask): ReplayTrace => traceTrial(job, index, trial);
