import type { Plan } from '../shared/model/plan';

/** Phase-noise tolerance of a satellite broadcast receiver, ETSI EN 302 307-1: [offset Hz, dBc/Hz]. */
const broadcastMask: [number, number][] = [
  [100, -25],
  [1_000, -50],
  [10_000, -73],
  [100_000, -93],
  [1_000_000, -103],
  [10_000_000, -114],
];

interface Bandwidths {
  acquire: number;
  track: number;
  /** Symbols after which the loop changes from acquire to track. */
  symbols: number;
}

const stages = ({ acquire, track, symbols }: Bandwidths) => [
  { name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: acquire, until: { symbols } },
  { name: 'track', damping: Math.SQRT1_2, noiseBandwidth: track },
];

const clock = (bandwidths: Bandwidths, delay = 0) => ({
  detector: 'gardner' as const,
  delay,
  stages: stages(bandwidths),
  arithmetic: { integratorLimitPpm: 100 },
});

/** A consumer downlink: a good transponder, a cheap tuner, 50 ppm between the two ends. */
export const transponder17 = (track: number, integratorLimitHz: number): Plan => ({
  name: 'Transponder 17, QPSK 27.5',
  target: 'corvid-c2',
  signal: { modulation: 'QPSK', symbolRateBd: 27.5e6, samplesPerSymbol: 2, rollOff: 0.35, esN0Db: 10 },
  carrier: {
    detector: 'sign',
    delay: 3,
    stages: stages({ acquire: 0.01, track, symbols: 8000 }),
    nco: { widthBits: 32 },
    arithmetic: { integratorLimitHz },
  },
  clock: clock({ acquire: 0.002, track: 0.0005, symbols: 8000 }, 3),
  environment: {
    carrierFrequencyHz: 1.55e9,
    carrierTolerancePpm: 25,
    clockTolerancePpm: 20,
    phaseNoise: broadcastMask,
  },
});

export const beacon: Plan = {
  name: 'Beacon, BPSK 9.6 k',
  target: 'corvid-c2',
  signal: { modulation: 'BPSK', symbolRateBd: 9_600, rollOff: 0.35, esN0Db: 10 },
  carrier: { detector: 'costas', delay: 1, stages: stages({ acquire: 0.02, track: 0.01, symbols: 4000 }) },
  clock: clock({ acquire: 0.004, track: 0.001, symbols: 4000 }),
  environment: { carrierFrequencyHz: 401.6e6, carrierTolerancePpm: 0.5, clockTolerancePpm: 10 },
};

export const ranging: Plan = {
  name: 'Ranging, BPSK 64 k',
  target: 'corvid-c2',
  signal: { modulation: 'BPSK', symbolRateBd: 64_000, rollOff: 0.5, esN0Db: 12 },
  carrier: { detector: 'sign', delay: 2, stages: stages({ acquire: 0.01, track: 0.004, symbols: 6000 }) },
  clock: clock({ acquire: 0.002, track: 0.0005, symbols: 6000 }),
  environment: { carrierFrequencyHz: 2.05e9, carrierTolerancePpm: 0.1, clockTolerancePpm: 5 },
};

export const telemetry: Plan = {
  name: 'Telemetry, QPSK 256 k',
  target: 'corvid-c1',
  signal: { modulation: 'QPSK', symbolRateBd: 256_000, rollOff: 0.35, esN0Db: 13 },
  carrier: { detector: 'sign', delay: 4, stages: stages({ acquire: 0.012, track: 0.005, symbols: 6000 }) },
  environment: { carrierFrequencyHz: 2.25e9, carrierTolerancePpm: 0.2 },
};

/** Wide for a fast start, and too wide for the delay that its pipeline has. */
export const hopBurst: Plan = {
  name: 'Hop burst, QPSK 400 k',
  target: 'corvid-c1',
  signal: { modulation: 'QPSK', symbolRateBd: 400_000, rollOff: 0.35, esN0Db: 12 },
  carrier: { detector: 'sign', delay: 6, stages: stages({ acquire: 0.1, track: 0.1, symbols: 400 }) },
  environment: { carrierFrequencyHz: 915e6, carrierTolerancePpm: 1 },
};
