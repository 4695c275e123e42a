import type { ConfigLoop, ConfigLoops, ConfigWords } from '../model/config';
import type { Achieved, LoopDesign, StageDesign } from '../model/design';
import type { WorkedLoops } from '../registers/quantities';

// Spelled out, so that the order of the keys does not follow that of a stored design.
const achieved = ({ wanted, exact, effective }: Achieved): Achieved => ({ wanted, exact, effective });

const stageOf = (stage: StageDesign): ConfigLoop['stages'][number] => ({
  name: stage.name,
  noiseBandwidth: achieved(stage.noiseBandwidth),
  noiseBandwidthHz: achieved(stage.noiseBandwidthHz),
  damping: achieved(stage.damping),
  naturalFrequencyHz: achieved(stage.naturalFrequencyHz),
  phaseMarginDeg: stage.margins.phaseDeg,
});

const loopOf = ({ updateRateHz, detector, stages }: LoopDesign): ConfigLoop => ({
  updateRateHz,
  detectorGain: detector.gain,
  stages: stages.map(stageOf),
});

/** What the words of each loop make. */
export const configLoops = ({ carrier, clock }: WorkedLoops): ConfigLoops => ({
  ...(carrier && { carrier: loopOf(carrier) }),
  ...(clock && { clock: loopOf(clock) }),
});

/** The words of each loop. */
export const configWords = ({ carrier, clock }: WorkedLoops): ConfigWords => ({
  ...(carrier?.words.loop === 'carrier' && { carrier: carrier.words }),
  ...(clock?.words.loop === 'clock' && { clock: clock.words }),
});
