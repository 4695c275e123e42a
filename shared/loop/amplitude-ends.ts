import type { AmplitudeEnd, AmplitudeEnds } from '../model/design';
import { dominantDamping } from './dominant-pair';
import { scaledLoop } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { gainCrossings, phaseMarginDeg } from './margins';
import { noiseBandwidth } from './noise-bandwidth';

/** What the gain control leaves open. */
export interface AmplitudeError {
  /** Error of the amplitude, ± dB. */
  toleranceDb: number;
  /** The detector's slope goes with the amplitude to this power. */
  exponent: number;
}

/** What a damping factor and a bandwidth per update are on the sheet. */
export interface SheetScale {
  /** Symbols per update. */
  updateInterval: number;
  /** Natural frequency in Hz of a pair with this θ. */
  frequencyHz: (theta: number) => number;
}

/** The loop with the amplitude too low and too high by the error of the gain control: its gain moves, its delay does not. */
export function amplitudeEnds(
  loop: LinearLoop,
  { toleranceDb, exponent }: AmplitudeError,
  scale: SheetScale,
): AmplitudeEnds {
  const end = (amplitudeDb: number): AmplitudeEnd =>
    endOf(scaledLoop(loop, 10 ** ((exponent * amplitudeDb) / 20)), amplitudeDb, exponent * amplitudeDb, scale);
  return { low: end(-toleranceDb || 0), high: end(toleranceDb) };
}

function endOf(loop: LinearLoop, amplitudeDb: number, gainDb: number, scale: SheetScale): AmplitudeEnd {
  const bandwidth = noiseBandwidth(loop);
  const pair = dominantDamping(loop);
  return {
    amplitudeDb,
    gainDb: gainDb || 0,
    stable: bandwidth !== null,
    noiseBandwidth: bandwidth === null ? null : bandwidth / scale.updateInterval,
    damping: pair?.damping ?? null,
    naturalFrequencyHz: pair ? scale.frequencyHz(pair.theta) : null,
    phaseDeg: bandwidth === null ? null : phaseMarginDeg(gainCrossings(loop), 0),
  };
}
