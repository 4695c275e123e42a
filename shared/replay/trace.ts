import { ncoClockHz } from '../fixed-point/headroom';
import { sampleLsbLog2 } from '../fixed-point/tables';
import { ParameterError } from '../parameter-error';
import type { ReplayJob } from './job';
import type { Outcome } from './phase-watch';
import { powerOf, runTrial, type BlockView } from './receiver';

/** One trial to look at; the arrays of a curve have one element for every `decimation` symbols. */
export interface ReplayTrace {
  symbols: number;
  decimation: number;
  symbol: number[];
  /** True phase error within ±180°/M, degrees. */
  phaseErrorDeg: number[];
  /** Loop word as a frequency above the centre, Hz. */
  frequencyHz: number[];
  integratorHz: number[];
  /** Index of the stage in use. */
  stage: number[];
  outcome: Outcome;
  /** Symbol from which the phase error stayed inside ±π/M; null where the trial did not lock. */
  lockedAtSymbol: number | null;
  /** Rotated samples in units of the amplitude, [in-phase, quadrature]: the first of the trial and the last. */
  constellation: { before: [number, number][]; after: [number, number][] };
}

const mostPoints = 2000;
const constellationPoints = 400;

/** Works one trial of a point out again from its seed. @throws {ParameterError} naming `trial` outside the check */
export function traceTrial(job: ReplayJob, pointIndex: number, trial: number): ReplayTrace {
  const { symbols, trials } = job.check;
  if (!Number.isInteger(trial) || trial < 0 || trial >= trials) {
    throw new ParameterError('trial', `the check has trials 0 to ${trials - 1}`);
  }
  const decimation = Math.ceil(symbols / mostPoints);
  const curves = { symbol: [], phaseErrorDeg: [], frequencyHz: [], integratorHz: [], stage: [] };
  const constellation: ReplayTrace['constellation'] = { before: [], after: [] };
  const record = recorder(job, decimation, curves, constellation);
  const { outcome, lockTimeSymbols } = runTrial(job, pointIndex, trial, record).result();
  const lockedAtSymbol = outcome === 'locked' ? lockTimeSymbols : null;
  return { symbols, decimation, ...curves, outcome, lockedAtSymbol, constellation };
}

type Curves = Pick<ReplayTrace, 'symbol' | 'phaseErrorDeg' | 'frequencyHz' | 'integratorHz' | 'stage'>;

function recorder(
  job: ReplayJob,
  decimation: number,
  curves: Curves,
  { before, after }: ReplayTrace['constellation'],
): (block: BlockView) => void {
  const { words, check, symbolRateBd } = job;
  const period = 360 / powerOf(job);
  const lsbHz = ncoClockHz(words, symbolRateBd) / 2 ** words.nco.widthBits;
  const unit = 2 ** sampleLsbLog2(words) / job.amplitude;
  let symbol = 0;

  return ({ nodes, count, errors }) => {
    for (let k = 0; k < count; k++, symbol++) {
      const point: [number, number] = [nodes.zI[k]! * unit, nodes.zQ[k]! * unit];
      if (symbol < constellationPoints) before.push(point);
      if (symbol >= check.symbols - constellationPoints) after.push(point);
      if (symbol % decimation !== 0) continue;
      curves.symbol.push(symbol);
      curves.phaseErrorDeg.push((errors[k]! - Math.floor(errors[k]! + 0.5)) * period);
      curves.frequencyHz.push((nodes.advance[k]! / words.nco.stepsPerSymbol) * lsbHz);
      curves.integratorHz.push(nodes.acc[k]! * 2 ** -words.guardBits * lsbHz);
      curves.stage.push(nodes.stage[k]!);
    }
  };
}
