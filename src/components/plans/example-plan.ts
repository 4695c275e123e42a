import type { Plan } from '../../../shared/model/plan';

/** The worked example of the handbook: a 27.5 MBd QPSK transponder through a consumer-grade oscillator. */
export const examplePlan = (target: string): Plan => ({
  name: 'Transponder 17, QPSK 27.5',
  target,
  signal: { modulation: 'QPSK', symbolRateBd: 27.5e6, samplesPerSymbol: 2, rollOff: 0.35, esN0Db: 10 },
  carrier: {
    detector: 'sign',
    order: 2,
    delay: 3,
    stages: [
      { name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: 0.01, until: { symbols: 8000 } },
      { name: 'track', damping: Math.SQRT1_2, noiseBandwidth: 0.004 },
    ],
    nco: { widthBits: 32 },
  },
  clock: {
    detector: 'gardner',
    order: 2,
    stages: [{ name: 'track', damping: Math.SQRT1_2, noiseBandwidth: 0.002 }],
  },
  environment: {
    carrierFrequencyHz: 1.55e9,
    carrierTolerancePpm: 25,
    clockTolerancePpm: 20,
    // Phase-noise tolerance of satellite broadcast receivers, ETSI EN 302 307-1, annex.
    phaseNoise: [
      [100, -25],
      [1e3, -50],
      [1e4, -73],
      [1e5, -93],
      [1e6, -103],
      [1e7, -114],
    ],
  },
});
