import { corvidC2Target } from '../../../seeds/corvid-c2-map';
import type { FileInput, TargetSnapshot } from '../../../shared/files/file-input';
import type { Design, LoopDesign, StageDesign } from '../../../shared/model/design';
import type { Plan } from '../../../shared/model/plan';
import type { CarrierWords, ClockWords, StageGainWords } from '../../../shared/model/words';

const overflow = {
  sample: 'saturate',
  error: 'saturate',
  proportional: 'saturate',
  increment: 'wrap',
  integrator: 'saturate',
  increment2: 'saturate',
  integrator2: 'saturate',
} as const;

const gains = (p: [number, number], i: [number, number]): StageGainWords => ({
  proportional: { mantissa: p[0], shift: p[1] },
  integral: { mantissa: i[0], shift: i[1] },
  integral2: { mantissa: 0, shift: 0 },
  untilSymbols: null,
  lockThreshold: null,
});

const common = {
  rounding: 'convergent',
  overflow,
  sampleBits: 12,
  sampleFullScaleLog2: 1,
  tableBits: 12,
  errorBits: 12,
  errorFullScaleLog2: 1,
  symbolsPerUpdate: 1,
  updatesPerSymbol: 1,
  delay: 3,
  order: 2,
  integratorBits: 40,
  guardBits: 8,
  integrator2Bits: 48,
  guard2Bits: 8,
  lock: { averagingSymbols: 256, power: 4, sign: -1 },
} as const;

/** A limit of ±250 kHz at 27.5 MBd: ⌊250e3·2^40/27.5e6⌋, which takes 34 bits. */
export const carrierWords: CarrierWords = {
  ...common,
  loop: 'carrier',
  detector: 'sign',
  modulation: 'qpsk',
  integratorLimit: 9995560252,
  stages: [{ ...gains([801, -3], [-547, -6]), untilSymbols: 4000, lockThreshold: 153 }, gains([1023, 12], [-2047, 31])],
  nco: { widthBits: 32, phaseBits: 12, stepsPerSymbol: 1, fcw: 4294967295 },
};

export const clockWords: ClockWords = {
  ...common,
  loop: 'clock',
  detector: 'gardner',
  interpolator: 'cubic',
  hold: true,
  integratorLimit: null,
  stages: [gains([1500, 4], [1200, -1]), gains([1111, 5], [1999, 2])],
  counter: { widthBits: 32, fractionBits: 8, nominalStep: 2147483648 },
};

const achieved = (wanted: number | null, exact: number | null, effective: number | null) => ({
  wanted,
  exact,
  effective,
});

const amplitudeEnd = (amplitudeDb: number) => ({
  amplitudeDb,
  gainDb: amplitudeDb,
  stable: true,
  noiseBandwidth: null,
  damping: null,
  naturalFrequencyHz: null,
  phaseDeg: null,
});

const stage = (name: string, proportional: number, integral: number): StageDesign => ({
  name,
  gains: { g1: 0.0263, g2: 0.00035, proportional, integral },
  stable: true,
  noiseBandwidth: achieved(0.01, 0.0100891912, 0.0100893),
  noiseBandwidthHz: achieved(275e3, 277452.758, 277455.7),
  damping: achieved(Math.SQRT1_2, Math.SQRT1_2, 0.7072),
  naturalFrequencyHz: achieved(null, 82526, null),
  bandwidthError: 1.07e-5,
  dampingError: -0.0123456,
  margins: { phaseDeg: 61.4, gainUp: 12, gainDown: null },
  effectivePhaseDeg: 61.41,
  poles: [],
  analogPoles: [],
  peakingDb: 2.1,
  bandwidth3Db: 0.02,
  bandwidth3DbHz: 550e3,
  settlingUpdates: 120,
  overshoot: 0.2,
  largestDelay: 38,
  largestGain: 12,
  words: { proportional: { mantissa: 801, shift: -3 }, integral: { mantissa: -547, shift: -6 } },
  phaseStep: { updates: [], phase: [] },
  response: { frequency: [], frequencyHz: [], hDb: [], eDb: [] },
  marginAgainstDelay: { delay: [], phaseDeg: [] },
  frequencyStep: null,
  frequencyRamp: null,
  rootLocus: { ratio: [], poles: [], critical: [] },
  bandwidthAgainstDelay: { delay: [], noiseBandwidth: [] },
  amplitude: { low: amplitudeEnd(-1), high: amplitudeEnd(1) },
});

const loop = (name: string, words: CarrierWords | ClockWords, stages: StageDesign[]): LoopDesign => ({
  updateRateHz: 27.5e6,
  detector: {
    name,
    gain: 1.388,
    gainWithoutNoise: Math.SQRT2,
    oscillatorGain: 1.46e-9,
    period: Math.PI / 2,
    variance: null,
    memoryless: true,
    spectrumAtZero: null,
    selfNoise: null,
    amplitudeExponent: 1,
    nulls: [],
    curve: { x: [], noiseless: [], noisy: [] },
  },
  stages,
  headroom: [],
  budget: null,
  acquisition: {
    unambiguousHz: null,
    falseLockSpacingHz: null,
    offsetHz: null,
    largestOffsetHz: null,
    offsetPpm: null,
    largestOffsetPpm: null,
    lockInHz: null,
    pullInSymbols: null,
    pullInRangeHz: null,
    pullOutHz: null,
    lockInPpm: null,
    settlingSymbols: null,
    totalSymbols: null,
    stages: [],
    lockDetector: null,
  },
  interpolator: null,
  resolutionHz: 0.0064,
  words,
});

// One error LSB is 2^(1 − 11) = 2^−10, so 801·2^3 output LSB per error LSB is 801·2^13 per detector unit; the
// integral gain counts eight guard bits more: 547·2^6·2^−8·2^10 = 547·2^8.
export const design: Pick<Design, 'carrier' | 'clock'> = {
  carrier: loop('sign', carrierWords, [stage('acquire', 801 * 2 ** 13, 547 * 2 ** 8), stage('track', 0.25, 2 ** -12)]),
  clock: loop('gardner', clockWords, [stage('acquire', 100, 10), stage('track', 30, 3)]),
};

export const plan: Plan = {
  name: 'Transponder 17, QPSK 27.5',
  target: 'corvid-c2',
  signal: { amplitude: 1, modulation: 'QPSK', symbolRateBd: 27.5e6, samplesPerSymbol: 2, rollOff: 0.35, esN0Db: 10 },
  carrier: {
    detector: 'sign',
    polarity: 1,
    stages: [
      { name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: 0.01, until: { symbols: 4000, lockMetric: 0.6 } },
      { name: 'track', damping: Math.SQRT1_2, noiseBandwidth: 0.004 },
    ],
    arithmetic: { integratorLimitHz: 250e3 },
    lockDetector: { averagingSymbols: 256, threshold: 0.6 },
  },
  clock: {
    detector: 'gardner',
    polarity: 1,
    stages: [
      { name: 'acquire', damping: 1, noiseBandwidth: 0.005 },
      { name: 'track', damping: 1, noiseBandwidth: 1e-7 },
    ],
  },
};

export const target: TargetSnapshot = { ...corvidC2Target, mapNumber: 6 };

export const digest = '9f3a51c7e2d8'.repeat(5).padEnd(64, '0');

/** A plan of two loops and two stages on the demo board, its words chosen by hand. */
export const input = (change: Partial<FileInput> = {}): FileInput => ({
  product: 'Keepstep',
  engine: '1.0.0',
  plan,
  planName: plan.name,
  revision: 14,
  digest,
  release: null,
  design,
  target,
  ...change,
});
