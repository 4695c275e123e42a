import type { CarrierWords, ClockWords, OverflowByNode, StageGainWords } from '../model/words';
import { ParameterError, requirePositive } from '../parameter-error';
import { ringRatiosOf } from '../detectors/modulations';
import { detectorLsbLog2 } from './datapath/phase-detector';
import { timingLsbLog2 } from './datapath/timing-detector';
import { exactRatio, floorOf, nearestOf, product, quotient, type Ratio } from './exact-ratio';
import { toStored, wrapUnsigned } from './format';
import { gainWord } from './gain-words';
import { bankTable } from './interpolator-table';
import { carrierOscillatorGain, clockOscillatorGain, errorLsb } from './loop-scale';
import { symmetry, type Modulation } from './symmetry';
import type {
  CarrierWordsInput,
  ClockWordsInput,
  WantedStage,
  WordArithmetic,
  WordLoop,
  WordSignal,
} from './words-input';

export type { CarrierWords, ClockWords, Words } from '../model/words';
export type * from './words-input';

/**
 * The integers of a carrier loop. A real gain in output LSB per error LSB is g/(Kd·K0) times one error LSB, and
 * times 2^G (2^(G+H)) for the integrators; each takes the nearest gain that the hardware can hold.
 *
 * @throws {ParameterError} with a pointer into the plan for what the datapath cannot hold
 */
export function carrierWords({ signal, carrier, detectorGain, stages }: CarrierWordsInput): CarrierWords {
  const { nco, detector } = carrier;
  requirePositive({ detectorGain });
  const shared = commonWords('/carrier', signal, carrier);
  if (nco.stepsPerSymbol % shared.updatesPerSymbol !== 0) {
    throw new ParameterError(
      '/carrier/nco/stepsPerSymbol',
      'the NCO steps must be a multiple of the updates per symbol',
    );
  }
  if (nco.phaseBits > nco.widthBits) {
    throw new ParameterError('/carrier/nco/phaseBits', 'the phase cannot have more bits than the NCO');
  }
  const clockHz = product(exactRatio(nco.stepsPerSymbol), exactRatio(signal.symbolRateBd));
  const perUnit = carrierOscillatorGain({ ...shared, nco }) * detectorGain;
  const words: CarrierWords = {
    loop: 'carrier',
    ...detectorWords(detector, signal),
    ...shared,
    tableBits: nco.tableBits,
    integratorLimit: integratorLimit(carrier, hertzLimit(carrier, clockHz)),
    stages: stages.map((stage) => stageWords(stage, carrier, perUnit)),
    nco: {
      widthBits: nco.widthBits,
      phaseBits: nco.phaseBits,
      stepsPerSymbol: nco.stepsPerSymbol,
      fcw: toStored(frequencyWord(exactRatio(nco.centreHz), clockHz, nco.widthBits)),
    },
  };
  requireErrorShift('/carrier', words, detectorLsbLog2(words));
  return words;
}

/**
 * The integers of a clock loop; the counter takes the place of the NCO.
 *
 * @throws {ParameterError} with a pointer into the plan for what the datapath cannot hold
 */
export function clockWords({ signal, clock, bank, detectorGain, stages }: ClockWordsInput): ClockWords {
  const { counter } = clock;
  requirePositive({ detectorGain });
  const shared = commonWords('/clock', signal, clock);
  if (shared.updatesPerSymbol > 1) {
    throw new ParameterError('/clock/updateInterval', 'a clock loop updates at most once a symbol');
  }
  const samples = exactRatio(signal.samplesPerSymbol);
  const step = nearestOf(quotient(exactRatio(2 ** counter.widthBits), samples));
  const scale = { ...shared, counter, hold: clock.hold };
  const words: ClockWords = {
    loop: 'clock',
    detector: clock.detector,
    interpolator: clock.interpolator,
    ...(bank && { taps: bankTable(bank, counter.tableBits) }),
    hold: clock.hold,
    ...shared,
    tableBits: counter.tableBits,
    integratorLimit: integratorLimit(clock, ppmLimit(clock, step, samples)),
    stages: stages.map((stage) =>
      stageWords(stage, clock, clockOscillatorGain(scale, signal.samplesPerSymbol) * detectorGain),
    ),
    counter: { widthBits: counter.widthBits, fractionBits: counter.fractionBits, nominalStep: toStored(step) },
  };
  requireErrorShift('/clock', words, timingLsbLog2(words));
  return words;
}

/** Frequency control word f0·2^W/fn to nearest, a half up, modulo 2^W. */
export const frequencyWord = (frequencyHz: Ratio, clockHz: Ratio, widthBits: number): bigint =>
  wrapUnsigned(nearestOf(quotient(product(frequencyHz, exactRatio(2 ** widthBits)), clockHz)), widthBits);

function commonWords(pointer: string, signal: WordSignal, loop: WordLoop) {
  const { arithmetic } = loop;
  requireGuard(`${pointer}/arithmetic/guardBits`, arithmetic.guardBits, arithmetic.integratorBits);
  requireGuard(`${pointer}/arithmetic/guard2Bits`, arithmetic.guard2Bits, arithmetic.integrator2Bits);
  return {
    rounding: arithmetic.rounding,
    overflow: overflowByNode(arithmetic.overflow),
    sampleBits: signal.sampleBits,
    sampleFullScaleLog2: signal.sampleFullScaleLog2,
    errorBits: arithmetic.errorBits,
    errorFullScaleLog2: arithmetic.errorFullScaleLog2,
    ...updateRate(`${pointer}/updateInterval`, loop.updateInterval),
    delay: loop.delay,
    order: loop.order,
    integratorBits: arithmetic.integratorBits,
    guardBits: arithmetic.guardBits,
    integrator2Bits: arithmetic.integrator2Bits,
    guard2Bits: arithmetic.guard2Bits,
    lock: { averagingSymbols: loop.lockDetector.averagingSymbols, ...symmetry(lowerCase(signal.modulation)) },
  };
}

function requireGuard(pointer: string, guardBits: number, widthBits: number): void {
  if (guardBits < widthBits) return;
  throw new ParameterError(pointer, `the guard bits must be fewer than the ${widthBits} bits of their integrator`);
}

/** No shift of the datapath is longer than 63, so that 64-bit arithmetic can do it. */
function requireErrorShift(pointer: string, { errorFullScaleLog2, errorBits }: CarrierWords | ClockWords, lsb: number) {
  const shift = errorFullScaleLog2 - (errorBits - 1) - lsb;
  if (Math.abs(shift) <= 63) return;
  throw new ParameterError(
    `${pointer}/arithmetic/errorFullScaleLog2`,
    `the detector value would be shifted by ${Math.abs(shift)} bits to the error word, at most 63 can be`,
  );
}

function detectorWords(detector: CarrierWords['detector'], signal: WordSignal) {
  const modulation = lowerCase(signal.modulation);
  if (detector === 'power-law') {
    const { power, sign } = symmetry(modulation);
    return { detector, power, powerSign: sign };
  }
  if (detector === 'costas' || detector === 'sign') return { detector, modulation };
  const ringRatios = ringRatiosOf(upperCase(signal.modulation), signal.ringRatios);
  const rings = ringRatios.length > 0 ? { ringRatios: [...ringRatios] } : {};
  return { detector, modulation, amplitude: signal.amplitude, ...rings };
}

const lowerCase = (modulation: WordSignal['modulation']): Modulation => modulation.toLowerCase() as Modulation;
const upperCase = (modulation: WordSignal['modulation']) => modulation.toUpperCase() as Uppercase<Modulation>;

function updateRate(pointer: string, interval: number): { symbolsPerUpdate: number; updatesPerSymbol: number } {
  if (Number.isInteger(interval) && interval >= 1) return { symbolsPerUpdate: interval, updatesPerSymbol: 1 };
  const updates = Math.round(1 / interval);
  if (interval > 0 && interval < 1 && Math.abs(updates * interval - 1) < 1e-6) {
    return { symbolsPerUpdate: 1, updatesPerSymbol: updates };
  }
  throw new ParameterError(pointer, 'the update interval must be a whole number of symbols or 1/m');
}

function overflowByNode(overflow: WordArithmetic['overflow']): OverflowByNode {
  const given: Partial<OverflowByNode> = typeof overflow === 'string' ? {} : overflow;
  const word = typeof overflow === 'string' ? overflow : 'saturate';
  return {
    sample: given.sample ?? word,
    error: given.error ?? word,
    proportional: given.proportional ?? word,
    increment: given.increment ?? word,
    integrator: given.integrator ?? word,
    increment2: given.increment2 ?? word,
    integrator2: given.integrator2 ?? word,
  };
}

function stageWords(stage: WantedStage, { arithmetic, polarity }: WordLoop, perUnit: number): StageGainWords {
  const { gainForm: form, mantissaBits, guardBits, guard2Bits } = arithmetic;
  const perError = (polarity * errorLsb(arithmetic)) / perUnit;
  const word = (g: number, guard: number) => gainWord({ gain: g * perError * 2 ** guard, form, mantissaBits });
  return {
    proportional: word(stage.g1, 0),
    integral: word(stage.g2 ?? 0, guardBits),
    integral2: word(stage.g3 ?? 0, guardBits + guard2Bits),
    untilSymbols: stage.untilSymbols,
    lockThreshold: stage.lockThreshold === null ? null : Math.floor(256 * stage.lockThreshold),
  };
}

/** Lim = ⌊integratorLimitHz·2^(Wn+G)/fn⌋. */
function hertzLimit({ nco, arithmetic }: CarrierWordsInput['carrier'], clockHz: Ratio): bigint | undefined {
  if (arithmetic.integratorLimitHz === undefined) return undefined;
  const scale = exactRatio(2 ** (nco.widthBits + arithmetic.guardBits));
  return floorOf(quotient(product(exactRatio(arithmetic.integratorLimitHz), scale), clockHz));
}

/** Lim = ⌊integratorLimitPpm·10^−6·step0·2^G⌋ with hold, samplesPerSymbol times that without. */
function ppmLimit({ hold, arithmetic }: ClockWordsInput['clock'], step: bigint, samples: Ratio): bigint | undefined {
  if (arithmetic.integratorLimitPpm === undefined) return undefined;
  const steps = { numerator: step << BigInt(arithmetic.guardBits), denominator: 1_000_000n };
  const limit = product(exactRatio(arithmetic.integratorLimitPpm), steps);
  return floorOf(hold ? limit : product(limit, samples));
}

function integratorLimit({ arithmetic }: WordLoop, limit: bigint | undefined) {
  if (limit === undefined) return null;
  const most = (1n << BigInt(arithmetic.integratorBits - 1)) - 1n;
  return toStored(limit < most ? limit : most);
}
