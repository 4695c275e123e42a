import { describe, expect, it } from 'vitest';
import { carrierDetectorsFor } from '../../../shared/detectors/carrier';
import { largestMagnitude, pointsOf, rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { largestSample } from '../../../shared/detectors/largest-sample';
import { detectorInDoubles } from '../../../shared/fixed-point/datapath/phase-detector-doubles';
import { detectorLsbLog2, phaseDetector } from '../../../shared/fixed-point/datapath/phase-detector';
import { detectorExtremes } from '../../../shared/fixed-point/detector-extremes';
import { carrierTables, sampleLsbLog2 } from '../../../shared/fixed-point/tables';
import { carrierWords } from '../../../shared/fixed-point/words';
import type { CarrierWords } from '../../../shared/fixed-point/words';
import { qpskLink } from './link';

const amplitude = 0.4;
const wordsOf = (detector: CarrierWords['detector'], modulation: Modulation) =>
  carrierWords({
    ...qpskLink,
    signal: { ...qpskLink.signal, modulation, amplitude, sampleBits: 14 },
    carrier: { ...qpskLink.carrier, detector },
  });

/** Largest magnitude of the integer detector over all symbols and 720 phases, detector units. */
function largestError(words: CarrierWords, modulation: Modulation): number {
  const value = detectorInDoubles(words, carrierTables(words).decision);
  const lsb = 2 ** sampleLsbLog2(words);
  let most = 0;
  pointsOf(modulation).forEach(([aI, aQ], known) => {
    for (let step = 0; step < 720; step += 1) {
      const [cos, sin] = [Math.cos((step * Math.PI) / 360 + 1e-3), Math.sin((step * Math.PI) / 360 + 1e-3)];
      const [i, q] = [aI * cos - aQ * sin, aI * sin + aQ * cos];
      const error = value(Math.round((amplitude * i) / lsb), Math.round((amplitude * q) / lsb), known);
      most = Math.max(most, Math.abs(error) * 2 ** detectorLsbLog2(words));
    }
  });
  return most;
}

const pairs = (Object.keys(rotationalSymmetry) as Modulation[])
  .filter((modulation) => modulation !== 'OQPSK')
  .flatMap((modulation) => carrierDetectorsFor(modulation).map((detector) => [detector, modulation] as const));

describe('detectorExtremes', () => {
  // Independent: the integer detector over every symbol and phase; what the power law cuts off adds less at most phases.
  it.each(pairs)('of %s on %s is what the detector reaches without noise', (detector, modulation) => {
    const words = wordsOf(detector, modulation);
    const { reached, worst } = detectorExtremes({
      words,
      amplitude,
      peak: largestMagnitude(modulation),
      railNoise: 0,
    });
    const most = largestError(words, modulation);
    expect(Math.abs(reached / most - 1)).toBeLessThan(detector === 'power-law' ? 0.1 : 0.02);
    expect(worst).toBeGreaterThan(reached);
  });

  // By hand: both strobes of OQPSK at a pattern that adds up; 2·√(½ + ½·(Σ |g(k + ½)|)²) of the amplitude at most.
  it('lets both samples of OQPSK add up', () => {
    const words = wordsOf('sign', 'OQPSK');
    const signal = { ...qpskLink.signal, modulation: 'OQPSK', rollOff: 1 } as Parameters<typeof largestSample>[0];
    // Roll-off 1 leaves g(±½) = ½ alone, so a half-way sample is as large as a strobe.
    expect(largestSample(signal)).toBeCloseTo(1, 9);
    const { reached } = detectorExtremes({ words, amplitude, peak: 1, railNoise: 0 });
    expect(reached).toBeCloseTo(2 * amplitude, 12);
    const one = BigInt(Math.round(amplitude * 2 ** 13));
    const most = phaseDetector(words)([0n, one], [-one, 0n], 0);
    expect(Number(most) * 2 ** detectorLsbLog2(words)).toBeCloseTo(2 * amplitude, 3);
  });
});
