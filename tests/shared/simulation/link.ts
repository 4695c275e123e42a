import { workOut } from '../../../shared/design';
import { carrierTables } from '../../../shared/fixed-point/tables';
import type { LoopDesign } from '../../../shared/model/design';
import type { CarrierWords } from '../../../shared/model/words';
import { replayCheck, type ReplayJob } from '../../../shared/replay/job';
import { filled } from '../sample-plan';

/** What a plan of these tests says; nothing is quantised coarsely. */
export interface Link {
  modulation?: string;
  detector?: string;
  ringRatios?: number[];
  esN0Db?: number;
  /** BnT per symbol. */
  noiseBandwidth?: number;
  damping?: number;
  order?: number;
  delay?: number;
  updateInterval?: number;
  integratorLimitHz?: number;
  environment?: object;
}

export interface Run {
  offsetHz?: number;
  symbols: number;
  trials: number;
}

/** Of every link here, so that hertz and cycles per symbol differ. */
export const symbolRateBd = 50_000;

/** Of every link here, sample units. */
export const amplitude = 0.7;

const arithmetic = {
  errorBits: 20,
  errorFullScaleLog2: 2,
  mantissaBits: 16,
  integratorBits: 50,
  guardBits: 12,
  integrator2Bits: 50,
  guard2Bits: 6,
};

/** The carrier loop of a link as the sheet shows it. */
export function carrierOf(link: Link): LoopDesign {
  const { modulation = 'QPSK', detector = 'sign', esN0Db = 10, noiseBandwidth = 0.01, damping, ...rest } = link;
  const { order = 2, delay = 0, updateInterval = 1, integratorLimitHz, environment = {}, ringRatios } = rest;
  const plan = {
    name: 'Simulated',
    target: 'none',
    signal: {
      modulation,
      symbolRateBd,
      esN0Db,
      amplitude,
      sampleBits: 17,
      ...(ringRatios && { ringRatios }),
    },
    carrier: {
      detector,
      order,
      delay,
      updateInterval,
      nco: { phaseBits: 16, tableBits: 18 },
      arithmetic: { ...arithmetic, ...(integratorLimitHz && { integratorLimitHz }) },
      stages: [{ name: 'track', noiseBandwidth, ...(damping && { damping }) }],
    },
    environment,
  };
  return workOut(filled(plan)).carrier!;
}

/** A replay of the words that the sheet gives. */
export function jobOf(link: Link, { words }: LoopDesign, { offsetHz = 0, symbols, trials }: Run): ReplayJob {
  const { modulation = 'QPSK', esN0Db = 10 } = link;
  const check = { name: 'Simulated', carrierOffsetHz: { start: offsetHz, stop: offsetHz, points: 1 } };
  return {
    words: words as CarrierWords,
    tables: carrierTables(words as CarrierWords),
    symbolRateBd,
    modulation,
    amplitude,
    check: replayCheck({ ...check, esN0Db: [esN0Db], symbols, trials, seed: 20261201 }),
  };
}
