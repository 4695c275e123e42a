import { describe, expect, it, vi } from 'vitest';
import { runPoint } from '../../../shared/replay/run-point';
import { carrierOf, jobOf, type Link } from './link';

// Millions of draws take their time on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

/** Settled symbols of a trial over the loop's time constant 1/BnT: four trials leave an rms uncertain by about 3 %. */
const constants = 200;

/** Many trials of APSK settle on a false null of its detector. */
const trialsOf = ({ modulation }: Link) =>
  modulation!.endsWith('APSK') ? { trials: 12, least: 3 } : { trials: 4, least: 4 };

/** Jitter of a replay over the sheet's total, and how many of the trials locked. */
function compared(link: Link, trials: number) {
  const carrier = carrierOf(link);
  const symbols = Math.ceil((5 * constants) / link.noiseBandwidth!);
  const { phaseJitterDeg, locks } = runPoint(jobOf(link, carrier, { symbols, trials }), 0);
  return { ratio: phaseJitterDeg! / carrier.budget!.stages[0]!.total!, locks };
}

const root = Math.SQRT1_2;

/** BnT, ζ, delay, updates every U symbols. */
const loops = [
  { noiseBandwidth: 0.002, damping: root, delay: 0, updateInterval: 1 },
  { noiseBandwidth: 0.02, damping: root, delay: 0, updateInterval: 1 },
  { noiseBandwidth: 0.02, damping: 0.5, delay: 3, updateInterval: 1 },
  { noiseBandwidth: 0.01, damping: 1.5, delay: 10, updateInterval: 1 },
  { noiseBandwidth: 0.005, damping: root, delay: 3, updateInterval: 4 },
  { noiseBandwidth: 0.01, damping: 0.5, delay: 0, updateInterval: 4 },
];

const detectors = [
  { modulation: 'BPSK', detector: 'costas', esN0Db: 10 },
  { modulation: 'BPSK', detector: 'sign', esN0Db: 10 },
  { modulation: 'BPSK', detector: 'decision', esN0Db: 12 },
  { modulation: 'BPSK', detector: 'power-law', esN0Db: 10 },
  { modulation: 'QPSK', detector: 'sign', esN0Db: 10 },
  { modulation: 'QPSK', detector: 'decision', esN0Db: 10 },
  { modulation: 'QPSK', detector: 'power-law', esN0Db: 10 },
  { modulation: 'QPSK', detector: 'known-symbols', esN0Db: 10 },
  { modulation: '8PSK', detector: 'decision', esN0Db: 16 },
  { modulation: '8PSK', detector: 'power-law', esN0Db: 18 },
  { modulation: '16QAM', detector: 'decision', esN0Db: 16 },
  { modulation: '16QAM', detector: 'known-symbols', esN0Db: 12 },
  { modulation: '64QAM', detector: 'decision', esN0Db: 24 },
  { modulation: '16APSK', detector: 'decision', esN0Db: 17 },
  { modulation: '32APSK', detector: 'decision', esN0Db: 20, ringRatios: [2.64, 4.64] },
];

/** Every detector on two of the loops, so that each loop meets five detectors. */
const matrix = detectors.flatMap((detector, i) =>
  [i, i + 2].map((loop) => ({ ...detector, ...loops[loop % loops.length]! })),
);

// Tolerance of a simulation against linear theory, BnT up to 0.02 and Es/N0 from 10 dB: within 10 %.
describe('the jitter of a replay against the budget', () => {
  it.each(matrix)('%j', (link) => {
    const { trials, least } = trialsOf(link);
    const { ratio, locks } = compared(link, trials);
    expect(locks).toBeGreaterThanOrEqual(least);
    expect(ratio).toBeGreaterThan(0.9);
    expect(ratio).toBeLessThan(1.1);
  });
});
