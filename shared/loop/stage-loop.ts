import { ParameterError } from '../parameter-error';
import type { CompleteCarrier, CompleteClock, CompleteStage } from '../plan/complete';
import { OutOfReach, exactLoop, largestTheta, placedLoop } from './exact-gains';
import type { LoopShape } from './exact-gains';
import { bandwidthOverOmega, nominalGains, thetaOf } from './gains';
import { linearLoop } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { requireStableForm } from './third-order-form';
import { significantDown } from '../math/significant';

/** Bandwidths that are worked out, cycles per update. */
const narrowest = 1e-7;
const widest = 0.5;

/** One stage of a loop as its plan describes it. */
export interface WantedLoop {
  /** JSON pointer of the stage. */
  pointer: string;
  stage: CompleteStage;
  loop: Pick<
    CompleteCarrier | CompleteClock,
    'order' | 'thirdOrder' | 'delay' | 'updateInterval' | 'method' | 'prewarp'
  >;
  symbolRateBd: number;
}

/** The unquantised loop of a stage. */
export interface StageLoop {
  loop: LinearLoop;
  /** Damping factor of the analog loop; of order 2 only. */
  damping: number | null;
  /** θ of the analog loop whose bilinear image the gains are: half its K, ωn or ω0 times Tu, warped where asked. */
  theta: number;
}

/** Symbols that are averaged into one update. */
export const averagedSymbols = (updateInterval: number): number => Math.max(1, updateInterval);

/**
 * The unquantised loop that a stage asks for: by the textbook formula, or with the wanted bandwidth and damping
 * including the delay.
 *
 * @throws {ParameterError} pointing at the value of the stage that cannot be reached
 */
export function stageLoop(wanted: WantedLoop): StageLoop {
  const { loop, pointer, stage } = wanted;
  if (loop.order !== 2 && stage.damping !== undefined) {
    throw new ParameterError(`${pointer}/damping`, `a loop of order ${loop.order} takes no damping factor`);
  }
  if (loop.order === 3) requireStableForm(loop.thirdOrder, formPointer(pointer));
  const damping = stage.damping ?? Math.SQRT1_2;
  const shape: LoopShape = {
    order: loop.order,
    damping,
    delay: loop.delay,
    averaged: averagedSymbols(loop.updateInterval),
    form: loop.thirdOrder,
  };
  const solved = loop.method === 'exact' ? exactStage(wanted, shape) : nominalStage(wanted, shape);
  return { ...solved, damping: loop.order === 2 ? damping : null };
}

/** The form belongs to the loop that the stage stands in. */
const formPointer = (stagePointer: string): string => stagePointer.replace(/\/stages\/\d+$/, '/thirdOrder');

type Solved = Pick<StageLoop, 'loop' | 'theta'>;

function nominalStage(wanted: WantedLoop, shape: LoopShape): Solved {
  const theta = thetaAt(wanted, wantedOmegaTu(wanted, shape));
  const gains = nominalGains(shape.order, { damping: shape.damping, theta, form: shape.form });
  return { loop: linearLoop({ gains, delay: shape.delay, averaged: shape.averaged }), theta };
}

function exactStage(wanted: WantedLoop, shape: LoopShape): Solved {
  const omegaTu = wantedOmegaTu(wanted, shape);
  if (wanted.stage.noiseBandwidth !== undefined) return exactBandwidth(wanted, shape);
  return shape.order === 2 ? exactFrequency(wanted, shape, omegaTu) : nominalStage(wanted, shape);
}

function exactBandwidth({ pointer, stage, loop }: WantedLoop, shape: LoopShape): Solved {
  try {
    return exactLoop(shape, (stage.noiseBandwidth as number) * loop.updateInterval);
  } catch (error) {
    if (!(error instanceof OutOfReach)) throw error;
    const reached = roundedDown(error.widestBandwidth / loop.updateInterval);
    throw new ParameterError(`${pointer}/noiseBandwidth`, `the widest BnT that this delay allows is ${reached}`);
  }
}

function exactFrequency(wanted: WantedLoop, shape: LoopShape, omegaTu: number): Solved {
  const theta = thetaAt(wanted, omegaTu);
  const loop = placedLoop(shape, theta);
  if (loop) return { loop, theta };
  const largest = largestTheta(shape, theta);
  const perUpdate = (wanted.loop.prewarp ? 2 * Math.atan(largest) : 2 * largest) / (2 * Math.PI);
  const reached = roundedDown((perUpdate * wanted.symbolRateBd) / wanted.loop.updateInterval);
  throw new ParameterError(
    `${wanted.pointer}/naturalFrequencyHz`,
    `the highest natural frequency that this delay allows is ${reached} Hz`,
  );
}

/** Free frequency of the analog loop times Tu: K, ωn or ω0. */
function wantedOmegaTu({ pointer, stage, loop, symbolRateBd }: WantedLoop, shape: LoopShape): number {
  const perOmega = bandwidthOverOmega(shape.order, shape.damping, shape.form);
  const [key, omegaTu] =
    stage.noiseBandwidth !== undefined
      ? ['noiseBandwidth', (stage.noiseBandwidth * loop.updateInterval) / perOmega]
      : [
          'naturalFrequencyHz',
          (2 * Math.PI * (stage.naturalFrequencyHz as number) * loop.updateInterval) / symbolRateBd,
        ];
  const bandwidth = omegaTu * perOmega;
  if (bandwidth >= narrowest && bandwidth <= widest) return omegaTu;
  throw new ParameterError(
    `${pointer}/${key}`,
    `${rangeSentence(key, { perOmega, symbolRateBd, updateInterval: loop.updateInterval })}`,
  );
}

function rangeSentence(key: string, scale: { perOmega: number; symbolRateBd: number; updateInterval: number }): string {
  const [low, high] = [narrowest, widest].map((bandwidth) =>
    key === 'noiseBandwidth'
      ? bandwidth / scale.updateInterval
      : ((bandwidth / scale.perOmega) * scale.symbolRateBd) / (2 * Math.PI * scale.updateInterval),
  ) as [number, number];
  return key === 'noiseBandwidth'
    ? `BnT with this update interval must lie between ${roundedDown(low)} and ${roundedDown(high)}`
    : `the natural frequency with this update interval must lie between ${roundedDown(low)} and ${roundedDown(high)} Hz`;
}

/** @throws {ParameterError} where the bilinear image ends */
function thetaAt({ pointer, stage, loop }: WantedLoop, omegaTu: number): number {
  if (!loop.prewarp || omegaTu < Math.PI) return thetaOf(omegaTu, loop.prewarp);
  const key = stage.noiseBandwidth !== undefined ? 'noiseBandwidth' : 'naturalFrequencyHz';
  throw new ParameterError(`${pointer}/${key}`, 'a pre-warped loop must stay below half the update rate');
}

/** A limit that is named must itself be allowed. */
const roundedDown = (value: number): number => significantDown(value, 4);
