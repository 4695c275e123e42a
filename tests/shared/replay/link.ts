import { carrierTables } from '../../../shared/fixed-point/tables';
import { carrierWords, type CarrierWordsInput } from '../../../shared/fixed-point/words';
import type { ReplayCheck, ReplayJob } from '../../../shared/replay/job';

export const symbolRateBd = 27.5e6;
const amplitude = 0.5;

export interface Link {
  /** Es/N0, dB. */
  esN0Db?: number;
  noiseBandwidth?: number;
  integratorLimitHz?: number;
  centreHz?: number;
  /** Widens the integrator past what doubles hold. */
  integratorBits?: number;
  check?: Partial<ReplayCheck>;
}

/** Power series of the error function, for arguments up to 4. */
function erf(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; n < 120; n++) {
    term *= (-x * x) / n;
    sum += term / (2 * n + 1);
  }
  return (2 / Math.sqrt(Math.PI)) * sum;
}

/** Slope of sgn(Re z) Im z − sgn(Im z) Re z at lock: A [√2 erf √(γ/2) − 2 √(γ/π) e^(−γ/2)]. */
export const signSlope = (esN0Db: number): number => {
  const gamma = 10 ** (esN0Db / 10);
  return amplitude * (Math.SQRT2 * erf(Math.sqrt(gamma / 2)) - 2 * Math.sqrt(gamma / Math.PI) * Math.exp(-gamma / 2));
};

/** Bilinear gains of order 2 for ζ = 1/√2 (Rice 2009, appendix C). */
export function gains(noiseBandwidth: number): { g1: number; g2: number } {
  const theta = noiseBandwidth / (Math.SQRT1_2 + 1 / (4 * Math.SQRT1_2));
  const scale = 1 + Math.SQRT2 * theta + theta ** 2;
  return { g1: (4 * Math.SQRT1_2 * theta) / scale, g2: (4 * theta ** 2) / scale };
}

/** A QPSK link on the sign detector. */
export function qpskJob(link: Link = {}): ReplayJob {
  const { esN0Db = 10, noiseBandwidth = 0.01, integratorBits = 44, integratorLimitHz, centreHz = 0, check } = link;
  const input: CarrierWordsInput = {
    signal: {
      modulation: 'QPSK',
      symbolRateBd,
      samplesPerSymbol: 2,
      amplitude,
      sampleBits: 12,
      sampleFullScaleLog2: 0,
    },
    carrier: {
      detector: 'sign',
      order: 2,
      updateInterval: 1,
      delay: 0,
      polarity: 1,
      nco: { widthBits: 32, phaseBits: 12, tableBits: 14, stepsPerSymbol: 1, centreHz },
      arithmetic: {
        errorBits: 14,
        errorFullScaleLog2: 1,
        gainForm: 'multiplier',
        mantissaBits: 14,
        integratorBits,
        guardBits: 12,
        integrator2Bits: 48,
        guard2Bits: 8,
        rounding: 'convergent',
        overflow: 'saturate',
        ...(integratorLimitHz === undefined ? {} : { integratorLimitHz }),
      },
      lockDetector: { averagingSymbols: 256 },
    },
    detectorGain: signSlope(esN0Db),
    stages: [{ ...gains(noiseBandwidth), untilSymbols: null, lockThreshold: null }],
  };
  const words = carrierWords(input);
  return {
    words,
    tables: carrierTables(words),
    symbolRateBd,
    modulation: 'QPSK',
    amplitude,
    check: {
      offsetsHz: [0],
      esN0Db: [esN0Db],
      symbols: 5000,
      trials: 20,
      seed: 65,
      limits: { lockProbability: 0.8, confidence: 0.95 },
      ...check,
    },
  };
}
