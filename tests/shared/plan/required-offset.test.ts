import { describe, expect, it } from 'vitest';
import { askedErrorPpm, askedOffsetHz, requiredOffsetHz } from '../../../shared/plan/required-offset';

describe('requiredOffsetHz', () => {
  // By hand: 25 ppm of 1.55 GHz is 38.75 kHz; two ends make 77.5 kHz.
  it('adds the tolerance of both ends', () => {
    expect(requiredOffsetHz({ carrierFrequencyHz: 1.55e9, carrierTolerancePpm: 25 })).toBe(77_500);
  });

  it('puts Doppler on top', () => {
    expect(requiredOffsetHz({ carrierFrequencyHz: 1.55e9, carrierTolerancePpm: 25, dopplerHz: 2_500 })).toBe(80_000);
  });

  it('asks for nothing where the plan gives nothing', () => {
    expect(requiredOffsetHz({})).toBe(0);
    expect(requiredOffsetHz({ carrierTolerancePpm: 25 })).toBe(0);
  });
});

describe('askedOffsetHz', () => {
  const environment = { carrierTolerancePpm: 25, dopplerHz: 100, dopplerRateHzPerS: 0, clockTolerancePpm: 0 };

  // Two ends add: ±25 ppm each of 1.55 GHz is ±77.5 kHz.
  it('adds both ends and the Doppler shift', () => {
    expect(askedOffsetHz({ ...environment, carrierFrequencyHz: 1.55e9 })).toBeCloseTo(77_600, 6);
  });

  it('is not known when the carrier is not', () => {
    expect(askedOffsetHz(environment)).toBeNull();
    expect(askedOffsetHz({ ...environment, carrierTolerancePpm: 0 })).toBe(100);
  });
});

describe('askedErrorPpm', () => {
  // Two clocks of ±20 ppm each drift apart by 40 ppm at most.
  it('adds both ends', () => {
    expect(askedErrorPpm({ clockTolerancePpm: 20 })).toBe(40);
  });
});
