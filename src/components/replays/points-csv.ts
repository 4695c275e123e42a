import type { ReplayPoint } from '../../../shared/model/replay-point';

type Column = readonly [head: string, of: (point: ReplayPoint) => number | string | null];

const columns: readonly Column[] = [
  ['es_n0_db', (point) => point.esN0Db],
  ['offset_hz', (point) => point.offsetHz],
  ['trials', (point) => point.trials],
  ['locks', (point) => point.locks],
  ['false_locks', (point) => point.falseLocks],
  ['lock_probability_lower', (point) => point.lockProbability.lower],
  ['lock_probability_upper', (point) => point.lockProbability.upper],
  ['lock_time_median_symbols', (point) => point.lockTimeSymbols?.p50 ?? null],
  ['lock_time_p95_symbols', (point) => point.lockTimeSymbols?.p95 ?? null],
  ['residual_offset_hz', (point) => point.residualOffsetHz],
  ['phase_jitter_deg_rms', (point) => point.phaseJitterDeg],
  ['phase_bias_deg', (point) => point.phaseBiasDeg],
  ['cycle_slips', (point) => point.cycleSlips],
  ['verdict', (point) => point.verdict],
  ['checksum', (point) => point.checksum],
];

/** Every finished point with all its digits, comma-separated with a head (RFC 4180); what does not exist is empty. */
export function pointsCsv(points: readonly ReplayPoint[]): string {
  const rows = points.map((point) => columns.map(([, of]) => String(of(point) ?? '')));
  return [columns.map(([head]) => head), ...rows].map((cells) => `${cells.join(',')}\r\n`).join('');
}
