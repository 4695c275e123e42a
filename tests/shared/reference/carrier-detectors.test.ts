import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { varianceOf } from '../../../shared/detectors/detector';
import { symbolErrorRate } from '../../../shared/detectors/symbol-error-rate';

/*
 * Quadrature over the plane by Debian's numpy and scipy, made by tests/reference/carrier_detectors.py from the
 * definitions of the detectors. The lattice is an eleventh of σ: good to a part in a thousand where e jumps.
 */
type Modulation = Parameters<typeof carrierDetector>[1]['modulation'];
interface Reference {
  curves: {
    modulation: Modulation;
    detector: Parameters<typeof carrierDetector>[0];
    esN0Db: number;
    phases: number[];
    s: number[];
    gain: number;
    variance: number;
  }[];
  errorRates: { modulation: Modulation; esN0Db: number; phase: number; rate: number }[];
}

const reference = JSON.parse(
  readFileSync(new URL('../../reference/carrier-detectors.json', import.meta.url), 'utf8'),
) as Reference;

const ringRatios = (modulation: Modulation): number[] | undefined =>
  ({ '16APSK': [2.85], '32APSK': [2.84, 5.27] })[modulation as string];
const esN0Of = (decibels: number): number => 10 ** (decibels / 10);

describe('carrier detectors against quadrature over the plane', () => {
  it.each(reference.curves)('$detector on $modulation at $esN0Db dB', (wanted) => {
    const { detector, modulation, esN0Db, phases, s, gain, variance } = wanted;
    const rings = ringRatios(modulation);
    const model = carrierDetector(detector, {
      modulation,
      amplitude: 1,
      esN0: esN0Of(esN0Db),
      rollOff: 0.35,
      ...(rings ? { ringRatios: rings } : {}),
    });
    const top = Math.max(...s.map(Math.abs));
    expect(Math.abs(model.gain / gain - 1)).toBeLessThan(2e-3);
    phases.forEach((phase, i) => expect(Math.abs(model.noisy(phase) - s[i]!) / top).toBeLessThan(2e-3));
    expect(Math.abs(varianceOf(model)! / variance - 1)).toBeLessThan(2e-3);
  });
});

describe('symbol error rates against quadrature over the plane', () => {
  it.each(reference.errorRates)('$modulation at $esN0Db dB, $phase rad off', ({ modulation, esN0Db, phase, rate }) => {
    const rings = ringRatios(modulation);
    const found = symbolErrorRate(modulation, { esN0: esN0Of(esN0Db), phase, ...(rings ? { ringRatios: rings } : {}) });
    // The lattice adds up a probability to about 1e−4.
    expect(Math.abs(found - rate)).toBeLessThan(2e-4 + 2e-3 * rate);
  });
});
