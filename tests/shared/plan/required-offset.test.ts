import { describe, expect, it } from 'vitest';
import { requiredOffsetHz } from '../../../shared/plan/required-offset';

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
