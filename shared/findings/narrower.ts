import { bandwidthOverOmega } from '../loop/gains';
import { stageLoop } from '../loop/stage-loop';
import type { LinearLoop } from '../loop/linear-loop';
import { ParameterError } from '../parameter-error';
import { setTo, twoDigitsDown } from './finding';
import type { Remedy } from './finding';
import { askedOf, bandwidthPointer } from './loop-view';
import type { StageView } from './loop-view';
import { fieldNumber } from '../plan/fields';
import { quantityText } from '../quantities/format';

/** The widest narrower loop of a stage that keeps a condition, as the edit that asks for it; null when none does. */
export function narrowerLoop(view: StageView, keeps: (loop: LinearLoop) => boolean): Remedy | null {
  const asked = askedOf(view);
  const kept = (share: number): boolean => {
    const loop = loopAt(view, share * asked);
    return loop !== null && keeps(loop);
  };
  let [low, high] = [1, 1];
  while (!kept(low) && low > 1e-4) [high, low] = [low, low / 2];
  if (low <= 1e-4) return null;
  for (let round = 0; round < 8; round += 1) {
    const middle = Math.sqrt(low * high);
    if (kept(middle)) low = middle;
    else high = middle;
  }
  return setBandwidth(view, twoDigitsDown(low * asked));
}

/** The edit that sets what decides the bandwidth of a stage. */
export function setBandwidth(view: StageView, value: number): Remedy {
  const pointer = bandwidthPointer(view);
  const text =
    view.stage.noiseBandwidth === undefined ? quantityText(value, { unit: 'Hz' }) : quantityText(value, { unit: '' });
  return setTo(`${fieldNumber(pointer)} of ${view.stage.name}`, pointer, value, text);
}

/** The loop of a stage with another bandwidth; null where no gains make it. */
export function loopAt({ key, index, stage, loop, plan }: StageView, value: number): LinearLoop | null {
  const bandwidth = stage.noiseBandwidth === undefined ? { naturalFrequencyHz: value } : { noiseBandwidth: value };
  const pointer = `/${key}/stages/${index}`;
  try {
    return stageLoop({ pointer, stage: { ...stage, ...bandwidth }, loop, symbolRateBd: plan.signal.symbolRateBd }).loop;
  } catch (error) {
    if (error instanceof ParameterError) return null;
    throw error;
  }
}

/** BnT that a stage asks for, also where it asks for a natural frequency. */
export function nominalBandwidth({ stage, result, loop, plan }: StageView): number {
  if (stage.noiseBandwidth !== undefined) return stage.noiseBandwidth;
  if (loop.method === 'exact' && result.noiseBandwidth.exact !== null) return result.noiseBandwidth.exact;
  const perOmega = bandwidthOverOmega(loop.order, stage.damping ?? 1, loop.thirdOrder);
  return (2 * Math.PI * (stage.naturalFrequencyHz as number) * perOmega) / plan.signal.symbolRateBd;
}
