import { describe, expect, it } from 'vitest';
import { carrierNodes } from '../../../shared/fixed-point/datapath/carrier-nodes';
import { carrierRunner } from '../../../shared/fixed-point/datapath/carrier-runner';
import { carrierTables, sampleLsbLog2 } from '../../../shared/fixed-point/tables';
import type { LoopDesign } from '../../../shared/model/design';
import type { CarrierWords } from '../../../shared/model/words';
import { amplitude, carrierOf, symbolRateBd, type Link } from './link';

/** Phase of the NCO before each symbol, radians, with a carrier of the phase given and BPSK symbols, without noise. */
function followed({ words: of }: LoopDesign, symbols: number, phaseAt: (symbol: number) => number): number[] {
  const words = of as CarrierWords;
  const perLsb = 2 ** -sampleLsbLog2(words);
  const rail = (turn: (angle: number) => number) =>
    Int32Array.from({ length: symbols }, (_, k) =>
      Math.round((k % 3 === 0 ? -1 : 1) * amplitude * perLsb * turn(phaseAt(k))),
    );
  const nodes = carrierNodes(symbols);
  carrierRunner(words, carrierTables(words)).run(
    rail(Math.cos),
    rail(Math.sin),
    new Uint8Array(symbols),
    symbols,
    nodes,
  );
  const turned: number[] = [];
  let phase = 0;
  for (const advance of nodes.advance) {
    turned.push(phase);
    phase += 2 * Math.PI * advance * 2 ** -words.nco.widthBits;
  }
  return turned;
}

/** Errors stay so small that the S-curve is a straight line. */
const small = 0.05;

const loops: Link[] = [
  { noiseBandwidth: 0.02 },
  { noiseBandwidth: 0.01, damping: 0.5, delay: 3 },
  { noiseBandwidth: 0.01, damping: 1.5, delay: 10 },
  { noiseBandwidth: 0.01, delay: 3, updateInterval: 4 },
].map((loop) => ({ modulation: 'BPSK', detector: 'sign', esN0Db: 40, ...loop }));

// The words and the rotator's phase bits round: responses agree within half a per cent of the step.
describe('the bit-true loop without noise against the curves', () => {
  it.each(loops)('follows a phase step as the sheet draws it: %j', (link) => {
    const carrier = carrierOf(link);
    const { updates, phase } = carrier.stages[0]!.phaseStep;
    const every = link.updateInterval ?? 1;
    const last = Math.min(updates.at(-1)! * every, 3000);
    // An update stands at the last symbol that it counts, and between updates the curve is a straight line.
    const nco = followed(carrier, last + every, (k) => small * Math.min(1, (k + 1) / every));
    const seen = updates.filter((update) => update * every <= last);
    const far = seen.map((update, i) => Math.abs(nco[update * every + every - 1]! / small - phase[i]!));
    expect(Math.max(...far)).toBeLessThan(0.005);
  });

  // Derived: a drift of ḟ leaves 2πḟTu²/g2 on a loop of order 2, whatever its delay.
  it.each(loops)('stands off by the static error of a drift: %j', (link) => {
    const carrier = carrierOf(link);
    const interval = (link.updateInterval ?? 1) / symbolRateBd;
    const { g2 } = carrier.stages[0]!.gains;
    const rateHzPerS = (small * g2) / (2 * Math.PI * interval ** 2);
    const phaseAt = (k: number) => Math.PI * rateHzPerS * (k / symbolRateBd) ** 2;
    const symbols = 4000;
    const nco = followed(carrier, symbols, phaseAt);
    const errors = nco.map((phase, k) => phaseAt(k) - phase).slice(-1000);
    const mean = errors.reduce((sum, error) => sum + error, 0) / errors.length;
    expect(Math.abs(mean / small - 1)).toBeLessThan(0.02);
    const drift = carrierOf({ ...link, environment: { dopplerRateHzPerS: rateHzPerS } }).budget!.drift;
    if (drift) expect((drift.staticError! * Math.PI) / 180).toBeCloseTo(small, 9);
  });
});

describe('the range that the integrator holds', () => {
  const link: Link = { modulation: 'BPSK', detector: 'sign', esN0Db: 40, noiseBandwidth: 0.02, integratorLimitHz: 150 };

  it('is followed without an error up to the limit, and with one beyond it', () => {
    const carrier = carrierOf(link);
    const held = carrier.acquisition.largestOffsetHz!;
    expect(held).toBeCloseTo(150, 3);
    const standing = (offsetHz: number): number => {
      const phaseAt = (k: number) => (2 * Math.PI * offsetHz * k) / symbolRateBd;
      const nco = followed(carrier, 3000, phaseAt);
      return phaseAt(2999) - nco[2999]!;
    };
    expect(Math.abs(standing(0.98 * held))).toBeLessThan(2e-3);
    // By hand: what is beyond the limit is left to the proportional path, Δω/g1.
    const beyond = (2 * Math.PI * 0.1 * held) / symbolRateBd / carrier.stages[0]!.gains.g1;
    expect(Math.abs(standing(1.1 * held) / beyond - 1)).toBeLessThan(0.02);
  });
});
