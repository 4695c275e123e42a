import { describe, expect, it } from 'vitest';
import { carrierDetector, carrierDetectorsFor } from '../../../shared/detectors/carrier';
import { varianceOf } from '../../../shared/detectors/detector';
import { pointsOf, rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { detectorInDoubles } from '../../../shared/fixed-point/datapath/phase-detector-doubles';
import { detectorLsbLog2 } from '../../../shared/fixed-point/datapath/phase-detector';
import { carrierTables, sampleLsbLog2 } from '../../../shared/fixed-point/tables';
import { carrierWords } from '../../../shared/fixed-point/words';
import { qpskLink } from '../fixed-point/link';
import { Noise } from './noise';

const amplitude = 0.5;
const symbols = 12_000;
/** Es/N0 at which decisions are partly wrong, dB. */
const levels: Partial<Record<Modulation, number>> = { BPSK: 3, QPSK: 6, '8PSK': 11, '16QAM': 13, '64QAM': 18 };

const pairs = (Object.keys(rotationalSymmetry) as Modulation[])
  .filter((modulation) => modulation !== 'OQPSK')
  .flatMap((modulation) => carrierDetectorsFor(modulation).map((detector) => [detector, modulation] as const));

type Pair = (typeof pairs)[number];

/** Values of the integer detector on noisy symbols turned by a static phase, in detector units. */
function simulated([detector, modulation]: Pair, gamma: number, phase: number): Float64Array {
  const noise = new Noise(modulation.length * 1000 + detector.length * 10 + Math.round(100 * phase));
  const signal = { ...qpskLink.signal, modulation, amplitude, sampleBits: 16, sampleFullScaleLog2: 0 };
  const words = carrierWords({ ...qpskLink, signal, carrier: { ...qpskLink.carrier, detector } });
  const value = detectorInDoubles(words, carrierTables(words).decision);
  const points = pointsOf(modulation);
  const [lsb, unit] = [2 ** sampleLsbLog2(words), 2 ** detectorLsbLog2(words)];
  const deviation = amplitude / Math.sqrt(2 * gamma);
  return Float64Array.from({ length: symbols }, () => {
    const known = noise.index(points.length);
    const [aI, aQ] = points[known]!;
    const i = amplitude * (aI * Math.cos(phase) - aQ * Math.sin(phase)) + deviation * noise.normal();
    const q = amplitude * (aI * Math.sin(phase) + aQ * Math.cos(phase)) + deviation * noise.normal();
    return unit * value(Math.round(i / lsb), Math.round(q / lsb), known);
  });
}

const meanOf = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;
const deviationOf = (values: Float64Array): number =>
  Math.sqrt(meanOf(values.map((value) => value ** 2)) - meanOf(values) ** 2);

// Independent: 12000 seeded symbols through the datapath's own detector, so that the scale is that of the hardware.
// Means and variances agree within four and a half of their own standard deviations; the lower bits that the power law
// cuts off add up to 1 % of the slope.
describe.each(pairs)('%s on %s, simulated', (detector, modulation) => {
  const gamma = 10 ** ((levels[modulation] ?? 15) / 10);
  const model = carrierDetector(detector, { modulation, amplitude, esN0: gamma, rollOff: 0.35 });
  const cut = detector === 'power-law' ? 0.01 : 1e-3;

  it.each([0.15, 0.4])('has the mean of its S-curve at %f of a period', (share) => {
    const values = simulated([detector, modulation], gamma, share * model.period);
    const tolerance = (4.5 * deviationOf(values)) / Math.sqrt(symbols) + cut * model.gain * share * model.period;
    expect(Math.abs(meanOf(values) - model.noisy(share * model.period))).toBeLessThan(tolerance);
  });

  it('has its variance at lock', () => {
    const squares = simulated([detector, modulation], gamma, 0).map((value) => value ** 2);
    const tolerance = (4.5 * deviationOf(squares)) / Math.sqrt(symbols) + 2 * cut * varianceOf(model)!;
    expect(Math.abs(meanOf(squares) - varianceOf(model)!)).toBeLessThan(tolerance);
  });
});
