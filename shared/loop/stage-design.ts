import type { Achieved, Gains, StageDesign, StageWords } from '../model/design';
import { amplitudeEnds } from './amplitude-ends';
import type { AmplitudeError } from './amplitude-ends';
import { analogPoles } from './analog-poles';
import { bandwidthAgainstDelay } from './bandwidth-against-delay';
import { dominantDamping } from './dominant-pair';
import type { LinearLoop } from './linear-loop';
import { gainCrossings, phaseMarginDeg, stabilityLimits } from './margins';
import { noiseBandwidth } from './noise-bandwidth';
import { closedLoopPoles } from './poles';
import { closedLoopShape, emptyResponse, marginCurve } from './response-curves';
import { boundedMemo } from '../math/bounded-memo';
import { rootLocus } from './root-locus';
import type { StageLoop, WantedLoop } from './stage-loop';
import { transientOf } from './transient';

export interface StageInput {
  wanted: WantedLoop;
  /** The unquantised loop. */
  solved: StageLoop;
  /** The loop that the words make. */
  effective: LinearLoop;
  words: StageWords;
  /** Kd·K0: loop-normalised gain per output LSB and detector unit. */
  perUnit: number;
  updateRateHz: number;
  amplitude: AmplitudeError;
}

/** What one stage does: gains, poles, margins and responses, unquantised and from its words. */
export function stageDesign(input: StageInput): StageDesign {
  const { wanted, solved, words } = input;
  const { loop } = solved;
  const achieved = achievedValues(input);
  const { limits, ...figures } = loopFigures({ loop, updateRateHz: input.updateRateHz });
  return {
    name: wanted.stage.name,
    gains: stageGains(input),
    ...achieved,
    bandwidthError: relativeError(achieved.noiseBandwidth),
    dampingError: relativeError(achieved.damping),
    margins: limits.margins,
    effectivePhaseDeg: phaseMarginDeg(gainCrossings(input.effective), 0),
    analogPoles: analogPoles({
      order: loop.order,
      damping: solved.damping ?? 1,
      omega: 2 * solved.theta * input.updateRateHz,
      form: wanted.loop.thirdOrder,
    }),
    largestDelay: limits.largestDelay,
    largestGain: limits.largestGain,
    words,
    ...figures,
    bandwidthAgainstDelay: bandwidthAgainstDelay(loop, limits.largestDelay, wanted.loop.updateInterval),
    amplitude: amplitudeEnds(loop, input.amplitude, {
      updateInterval: wanted.loop.updateInterval,
      frequencyHz: (theta) => frequencyHz(wanted, theta),
    }),
  };
}

/**
 * What follows from the unquantised loop alone. The last few are kept: while words, noise or limits are typed, the loops
 * stay as they are.
 */
const loopFigures = boundedMemo(
  ({ loop, updateRateHz }: { loop: LinearLoop; updateRateHz: number }) => {
    const limits = stabilityLimits(loop);
    const poles = closedLoopPoles(loop);
    return {
      limits,
      poles,
      ...responses(loop, poles, updateRateHz),
      marginAgainstDelay: marginCurve(loop, limits.crossings),
      rootLocus: rootLocus(loop, poles, limits.criticalRatios),
    };
  },
  ({ loop: { gains, order, delay, averaged }, updateRateHz }) =>
    [gains.g1, gains.g2, gains.g3, order, delay, averaged, updateRateHz].join(' '),
  16,
);

function stageGains({ wanted, solved, perUnit }: StageInput): Gains {
  const { g1, g2, g3 } = solved.loop.gains;
  const gains = { g1, g2, proportional: g1 / perUnit, integral: g2 / perUnit };
  return wanted.loop.order === 3 ? { ...gains, g3, integral2: g3 / perUnit } : gains;
}

function achievedValues({ wanted, solved, effective }: StageInput) {
  const { stage, loop, symbolRateBd } = wanted;
  const perSymbol = (value: number | null): number | null => value && value / loop.updateInterval;
  const bandwidth = (of: LinearLoop): number | null => perSymbol(noiseBandwidth(of));
  const exact = bandwidth(solved.loop);
  const noise = { wanted: stage.noiseBandwidth ?? null, exact, effective: bandwidth(effective) };
  const [pair, effectivePair] = [solved.loop, effective].map(dominantDamping);
  return {
    stable: exact !== null,
    noiseBandwidth: noise,
    noiseBandwidthHz: mapAchieved(noise, (value) => value * symbolRateBd),
    damping: { wanted: solved.damping, exact: pair?.damping ?? null, effective: effectivePair?.damping ?? null },
    naturalFrequencyHz: {
      wanted: stage.naturalFrequencyHz ?? null,
      exact: pair ? frequencyHz(wanted, pair.theta) : null,
      effective: effectivePair ? frequencyHz(wanted, effectivePair.theta) : null,
    },
  };
}

/** Natural frequency of an analog pair with this θ, un-warped where the plan pre-warps, Hz. */
const frequencyHz = ({ loop, symbolRateBd }: WantedLoop, theta: number): number =>
  ((loop.prewarp ? Math.atan(theta) : theta) * symbolRateBd) / (Math.PI * loop.updateInterval);

function responses(loop: LinearLoop, poles: [number, number][], updateRateHz: number) {
  const slowest = poles.length ? Math.hypot(...(poles[0] as [number, number])) : 1;
  if (!(slowest < 1) || noiseBandwidth(loop) === null) return noResponses(loop, updateRateHz);
  const shape = closedLoopShape(loop, updateRateHz);
  return {
    peakingDb: shape.peakingDb,
    bandwidth3Db: shape.bandwidth3Db,
    bandwidth3DbHz: shape.bandwidth3Db && shape.bandwidth3Db * updateRateHz,
    response: shape.response,
    ...(transientOf(loop, poles) ?? noTransient),
  };
}

const noTransient = {
  settlingUpdates: null,
  overshoot: null,
  phaseStep: { updates: [], phase: [] },
  frequencyStep: null,
  frequencyRamp: null,
};

/** An unstable loop has no closed-loop response. */
const noResponses = (loop: LinearLoop, updateRateHz: number) => ({
  peakingDb: null,
  bandwidth3Db: null,
  bandwidth3DbHz: null,
  response: emptyResponse(loop, updateRateHz),
  ...noTransient,
});

const mapAchieved = ({ wanted, exact, effective }: Achieved, map: (value: number) => number): Achieved => ({
  wanted: wanted === null ? null : map(wanted),
  exact: exact === null ? null : map(exact),
  effective: effective === null ? null : map(effective),
});

const relativeError = ({ exact, effective }: Achieved): number | null =>
  exact === null || effective === null ? null : (effective - exact) / exact;
