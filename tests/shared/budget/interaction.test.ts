import { describe, expect, it } from 'vitest';
import { interferencePower } from '../../../shared/budget/interaction';
import { workOut } from '../../../shared/design';
import { samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';
import { gaussians } from './noise';

const designOf = (parts: PlanParts = {}) => workOut(samplePlan(parts));

/** g and g′ of the raised-cosine pulse by its textbook formula and a difference. */
const pulse = (t: number, rollOff: number): number => {
  const u = 2 * rollOff * t;
  const sinc = t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t);
  return Math.abs(1 - u * u) < 1e-9 ? (sinc * Math.PI) / 4 : (sinc * Math.cos((Math.PI * u) / 2)) / (1 - u * u);
};
const slope = (t: number, rollOff: number): number => (pulse(t + 1e-5, rollOff) - pulse(t - 1e-5, rollOff)) / 2e-5;

describe('interferencePower', () => {
  // The sum over the symbols themselves.
  it.each([0.1, 0.2, 0.35, 0.5, 0.9])('is Σ g′(k)² at roll-off %f', (rollOff) => {
    let sum = 0;
    for (let k = 1; k < 400; k += 1) sum += 2 * slope(k, rollOff) ** 2;
    expect(interferencePower(rollOff)).toBeCloseTo(sum, 4);
  });

  // Σ 1/k² over both sides, L. Euler: π²/3.
  it('is π²/3 at roll-off 0', () => {
    expect(interferencePower(0)).toBeCloseTo(Math.PI ** 2 / 3, 12);
  });
});

describe('loopInteraction', () => {
  it('says who needs whom', () => {
    expect(designOf().interaction).toMatchObject({
      clockNeedsCarrier: false,
      carrierNeedsClock: true,
      startFirst: 'clock',
      clockGainFromPhase: 1,
    });
    expect(designOf({ clock: { detector: 'zero-crossing' } }).interaction).toMatchObject({
      clockNeedsCarrier: true,
      startFirst: 'neither',
    });
    expect(designOf({ clock: undefined }).interaction).toBeNull();
  });

  it('compares the loops in Hz', () => {
    const { interaction, carrier, clock } = designOf();
    const hertz = (loop: typeof carrier): number => loop!.stages.at(-1)!.noiseBandwidthHz.exact!;
    expect(interaction!.bandwidthRatio).toBeCloseTo(hertz(carrier) / hertz(clock), 9);
  });

  // The mean cosine of a normal angle, e^(−σ²/2).
  it('turns a deciding timing detector by the phase jitter', () => {
    const { interaction, carrier } = designOf({ clock: { detector: 'zero-crossing' } });
    const sigma = (carrier!.budget!.stages.at(-1)!.total! * Math.PI) / 180;
    expect(interaction!.clockGainFromPhase).toBeCloseTo(Math.exp((-sigma * sigma) / 2), 12);
  });

  // A seeded simulation in this file: QPSK through the pulse, each strobe late by the same small share of a symbol, through
  // a loop of order 1 that knows the symbols; the phase within 6 %, the power of the error within 2 %.
  it('passes a late strobe on as phase jitter', () => {
    const [rollOff, late, gain, symbols, reach] = [0.35, 0.03, 0.02, 400_000, 12];
    const noise = gaussians(3);
    const data = Array.from({ length: symbols + 2 * reach }, () => [Math.sign(noise()), Math.sign(noise())] as const);
    const taps = Array.from({ length: 2 * reach + 1 }, (_, i) => pulse(i - reach + late, rollOff));
    let [phase, square, power] = [0, 0, 0];
    for (let k = reach; k < symbols + reach; k += 1) {
      let [re, im] = [0, 0];
      taps.forEach((tap, i) => {
        const [a, b] = data[k - (i - reach)]!;
        re += (tap * a) / Math.SQRT2;
        im += (tap * b) / Math.SQRT2;
      });
      const [a, b] = data[k]!;
      power += (re - a / Math.SQRT2) ** 2 + (im - b / Math.SQRT2) ** 2;
      const error = (im * a - re * b) / Math.SQRT2;
      square += phase ** 2;
      phase += gain * (error - phase);
    }
    const bandwidth = gain / (2 * (2 - gain));
    const expected = 2 * bandwidth * late ** 2 * interferencePower(rollOff);
    expect(Math.abs(square / symbols / expected - 1)).toBeLessThan(0.06);
    expect(Math.abs(power / symbols / (late ** 2 * interferencePower(rollOff)) - 1)).toBeLessThan(0.03);
    const { interaction, carrier, clock } = designOf();
    const sheet = 2 * carrier!.stages.at(-1)!.noiseBandwidth.exact! * clock!.budget!.stages.at(-1)!.total! ** 2;
    expect(((interaction!.carrierFromTimingDeg! * Math.PI) / 180) ** 2).toBeCloseTo(
      sheet * interferencePower(0.35),
      12,
    );
  });

  // By hand: 4π²ξ = 3.5189 at roll-off 0.35; σ = 0.0057 costs ½·3.5189σ² of amplitude, and γ·σ²·Σ g′² of noise.
  it('costs signal and adds noise', () => {
    const { interaction, clock } = designOf();
    const square = clock!.budget!.stages.at(-1)!.total! ** 2;
    const byHand =
      -20 * Math.log10(1 - 0.5 * 3.5189 * square) + 10 * Math.log10(1 + 10 * square * interferencePower(0.35));
    expect(interaction!.lossFromTimingDb! / byHand).toBeCloseTo(1, 3);
  });

  it('passes nothing on to a carrier with data on one rail', () => {
    const { interaction } = designOf({ signal: { modulation: 'BPSK' } });
    expect(interaction!.carrierFromTimingDeg).toBe(0);
  });
});
