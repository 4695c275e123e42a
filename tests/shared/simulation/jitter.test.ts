import { describe, expect, it, vi } from 'vitest';
import { runPoint } from '../../../shared/replay/run-point';
import { carrierOf, jobOf, type Link } from './link';

// Millions of draws take their time on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

const trials = 4;
/** Settled symbols of all trials over the loop's time constant 1/BnT: leaves an rms uncertain by about 3 %. */
const constants = 800;

/** Jitter of a replay over the sheet's total, and how many of the trials locked. */
function compared(link: Link) {
  const carrier = carrierOf(link);
  const symbols = Math.ceil((5 * constants) / (trials * link.noiseBandwidth!));
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
  { modulation: 'QPSK', detector: 'sign', esN0Db: 10 },
  { modulation: 'QPSK', detector: 'sign', esN0Db: 15 },
];

const matrix = detectors.flatMap((detector) => loops.map((loop) => ({ ...detector, ...loop })));

// design.md's tolerance of a simulation against linear theory (BnT up to 0.02, Es/N0 from 10 dB): within 10 %.
describe('the jitter of a replay against the budget', () => {
  it.each(matrix)('%j', (link) => {
    const { ratio, locks } = compared(link);
    expect(locks).toBe(trials);
    expect(ratio).toBeGreaterThan(0.9);
    expect(ratio).toBeLessThan(1.1);
  });
});
