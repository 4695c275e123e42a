import { interpolate } from '../../shared/math/interpolation';
import type { Design, StageDesign } from '../../shared/model/design';
import type { LoopSummary } from '../repositories/revision-rows';

const samples = 48;
const first = 4;
const last = 1200;

/** Loop updates at which a list draws the phase step: 48, evenly spaced on a log axis from 4 to 1200. */
const grid = Array.from({ length: samples }, (_, i) => first * (last / first) ** (i / (samples - 1)));

const stepOf = ({ phaseStep: { updates, phase } }: StageDesign): number[] =>
  grid.map((at) => Number(interpolate(updates, phase, at).toPrecision(4)));

/** What a list says of a design: the last stage of the carrier loop, of the clock loop where there is no other. */
export function loopSummary({ carrier, clock }: Design): LoopSummary | null {
  const stage = (carrier ?? clock)?.stages.at(-1);
  if (!stage) return null;
  return {
    loop: carrier ? 'carrier' : 'clock',
    noiseBandwidth: stage.noiseBandwidth.exact,
    phaseMarginDeg: stage.margins.phaseDeg,
    step: stepOf(stage),
  };
}
