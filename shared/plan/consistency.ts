import { ringRatiosOf } from '../detectors/modulations';
import { ParameterError } from '../parameter-error';
import type { CompletePlan } from './complete';

/**
 * What a plan must keep beyond its schema: values that have to fit one another, ring ratios their modulation.
 *
 * @throws {ParameterError} with a JSON pointer into the plan
 */
export function requireConsistent(plan: CompletePlan): void {
  for (const key of ['carrier', 'clock'] as const) requireDistinctStages(key, plan[key]?.stages ?? []);
  ringRatiosOf(plan.signal.modulation, plan.signal.ringRatios);
  requireRisingOffsets(plan.environment.phaseNoise ?? []);
}

function requireDistinctStages(key: string, stages: { name: string }[]): void {
  stages.forEach(({ name }, i) => {
    if (stages.findIndex((other) => other.name === name) === i) return;
    throw new ParameterError(`/${key}/stages/${i}/name`, `two stages are called ${name}`);
  });
}

function requireRisingOffsets(table: [number, number][]): void {
  table.forEach(([offsetHz], i) => {
    if (i === 0 || offsetHz > (table[i - 1] as [number, number])[0]) return;
    throw new ParameterError(`/environment/phaseNoise/${i}/0`, 'the offsets of the phase-noise table must rise');
  });
}
