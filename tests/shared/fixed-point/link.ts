import type { CarrierWordsInput, ClockWordsInput } from '../../../shared/fixed-point/words';

/** A QPSK link at 27.5 MBd with order-2 gains for ζ = 1/√2, BnT = 0.01: g1 = 300/11401, g2 = 4/11401 (Rice 2009, app. C). */
export const qpskLink: CarrierWordsInput = {
  signal: {
    modulation: 'QPSK',
    symbolRateBd: 27.5e6,
    samplesPerSymbol: 2,
    amplitude: 0.5,
    sampleBits: 12,
    sampleFullScaleLog2: 0,
  },
  carrier: {
    detector: 'sign',
    order: 2,
    updateInterval: 1,
    delay: 0,
    polarity: 1,
    nco: { widthBits: 32, phaseBits: 12, tableBits: 14, stepsPerSymbol: 1, centreHz: 0 },
    arithmetic: {
      errorBits: 12,
      errorFullScaleLog2: 1,
      gainForm: 'multiplier',
      mantissaBits: 12,
      integratorBits: 44,
      guardBits: 12,
      integrator2Bits: 48,
      guard2Bits: 8,
      rounding: 'nearest',
      overflow: 'saturate',
    },
    lockDetector: { averagingSymbols: 256 },
  },
  detectorGain: 0.5,
  stages: [{ g1: 300 / 11401, g2: 4 / 11401, untilSymbols: null, lockThreshold: null }],
};

/** The same link's clock loop: Gardner at 2 samples per symbol. */
export const gardnerLink: ClockWordsInput = {
  signal: qpskLink.signal,
  clock: {
    ...qpskLink.carrier,
    detector: 'gardner',
    interpolator: 'cubic',
    hold: true,
    counter: { widthBits: 32, fractionBits: 8, tableBits: 12 },
    arithmetic: { ...qpskLink.carrier.arithmetic },
  },
  detectorGain: 0.27,
  stages: [{ g1: 0.01, g2: 0.00005, untilSymbols: 5000, lockThreshold: 0.5 }],
};
