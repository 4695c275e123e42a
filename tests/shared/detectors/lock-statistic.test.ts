import { describe, expect, it } from 'vitest';
import { lockStatistic } from '../../../shared/detectors/lock-statistic';
import { pointsOf, rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { lockDetector } from '../../../shared/fixed-point/datapath/lock-detector';
import { carrierWords } from '../../../shared/fixed-point/words';
import { qpskLink } from '../fixed-point/link';
import { Noise } from './noise';

const ratio = (decibels: number): number => 10 ** (decibels / 10);
const statistic = (modulation: Modulation, decibels: number, jitterVariance = 0, averagingSymbols = 256) =>
  lockStatistic({ modulation, esN0: ratio(decibels), jitterVariance, averagingSymbols });

describe('lockStatistic', () => {
  // Derived: −E z⁴ = 1 and E|z|⁴ = 1 + 4/γ + 2/γ² for QPSK.
  it.each([5, 10, 20])('has 1/(1 + 4/γ + 2/γ²) as its mean for QPSK at %i dB', (decibels) => {
    const gamma = ratio(decibels);
    expect(statistic('QPSK', decibels).meanLocked).toBeCloseTo(1 / (1 + 4 / gamma + 2 / gamma ** 2), 12);
  });

  // Published: jitter alone gives e^(−M²σ²/2), 5° with M = 4 → .9409; unlocked 1/√(2N).
  it('loses by jitter alone what the mean of cos Mφ loses', () => {
    const { meanLocked, deviationUnlocked } = statistic('QPSK', 90, ((5 * Math.PI) / 180) ** 2, 200);
    expect(meanLocked).toBeCloseTo(0.9409, 4);
    expect(deviationUnlocked).toBeCloseTo(1 / Math.sqrt(400), 6);
  });

  // Derived: E a⁴ = −0.68 and E|a|⁴ = 1.32 of 16QAM, by hand over (1 ± j), (1 ± 3j), (3 ± 3j).
  it('keeps 0.68/1.32 of 16QAM without noise', () => {
    expect(statistic('16QAM', 90).meanLocked).toBeCloseTo(0.68 / 1.32, 6);
  });

  it('varies with the jitter of many symbols together where the loop is slow', () => {
    const signal = { modulation: 'QPSK', esN0: 1e9, jitterVariance: 0.01, averagingSymbols: 100 } as const;
    const slow = lockStatistic({ ...signal, noiseBandwidth: 0.001 }).deviationLocked;
    // Derived: the deviation of cos 4φ itself, (1 − e^(−16σ²))/√2.
    expect(slow).toBeCloseTo((1 - Math.exp(-0.16)) / Math.SQRT2, 6);
    expect(lockStatistic(signal).deviationLocked).toBeGreaterThan(slow / 10);
    expect(lockStatistic({ ...signal, noiseBandwidth: 0.05 }).deviationLocked).toBeLessThan(slow / 3);
  });

  // Independent: blocks of simulated symbols, 400 of 128; mean to four of its deviations, deviations to 15 %.
  it.each(Object.keys(rotationalSymmetry) as Modulation[])('is what blocks of noisy %s symbols give', (modulation) => {
    const [blocks, symbols, jitter, gamma] = [400, 128, 0.002, ratio(12)];
    const expected = lockStatistic({
      modulation,
      esN0: gamma,
      jitterVariance: jitter,
      averagingSymbols: symbols,
      rollOff: 0.5,
    });
    const locked = blockStatistics({
      modulation,
      blocks,
      symbols,
      gamma,
      phase: (noise) => Math.sqrt(jitter) * noise.normal(),
    });
    const unlocked = blockStatistics({
      modulation,
      blocks,
      symbols,
      gamma,
      phase: (noise) => 2 * Math.PI * noise.uniform(),
    });
    expect(Math.abs(locked.mean - expected.meanLocked)).toBeLessThan(
      (4.5 * expected.deviationLocked) / Math.sqrt(blocks),
    );
    expect(Math.abs(locked.deviation / expected.deviationLocked - 1)).toBeLessThan(0.15);
    expect(Math.abs(unlocked.deviation / expected.deviationUnlocked - 1)).toBeLessThan(0.15);
  });

  // Independent: the integer lock detector on the same symbols; its seven bits cost some 2 %.
  it('is what the integer lock detector counts', () => {
    const noise = new Noise(3);
    const words = carrierWords({ ...qpskLink, signal: { ...qpskLink.signal, sampleBits: 12, sampleFullScaleLog2: 1 } });
    const add = lockDetector({ ...words, lock: { ...words.lock, averagingSymbols: 1024 } });
    const deviation = Math.sqrt(1 / (2 * ratio(12)));
    let [sum, count] = [0, 0];
    for (let k = 0; k < 20 * 1024; k += 1) {
      const rail = () =>
        BigInt(Math.round(1024 * ((noise.uniform() < 0.5 ? -1 : 1) * Math.SQRT1_2 + deviation * noise.normal())));
      const block = add([rail(), rail()]);
      if (block) [sum, count] = [sum + Number(block.num) / Number(block.den), count + 1];
    }
    expect(Math.abs(sum / count / statistic('QPSK', 12).meanLocked - 1)).toBeLessThan(0.02);
  });
});

interface Blocks {
  modulation: Modulation;
  blocks: number;
  symbols: number;
  gamma: number;
  phase: (noise: Noise) => number;
}

function blockStatistics({ modulation, blocks, symbols, gamma, phase }: Blocks) {
  const noise = new Noise(20261201);
  const points = pointsOf(modulation);
  const power = rotationalSymmetry[modulation];
  const sign = power === 4 ? -1 : 1;
  // Raised cosine of roll-off ½ at k + ½: the tap of the nearest symbols and of those beyond.
  const taps = [0, 1, 2, 3, 4].map((k) => {
    const t = k + 0.5;
    return (
      (Math.sin(Math.PI * t) / (Math.PI * t)) * (t === 1 ? Math.PI / 4 : Math.cos((Math.PI * t) / 2) / (1 - t * t))
    );
  });
  const between = () =>
    taps.reduce((sum, tap) => sum + tap * (Math.sign(noise.uniform() - 0.5) + Math.sign(noise.uniform() - 0.5)), 0);
  const values = Array.from({ length: blocks }, () => {
    let [num, den] = [0, 0];
    for (let k = 0; k < symbols; k += 1) {
      const point = points[noise.index(points.length)]!;
      const [aI, aQ] = modulation === 'OQPSK' ? [point[0], Math.SQRT1_2 * between()] : point;
      const turn = phase(noise);
      const i = aI * Math.cos(turn) - aQ * Math.sin(turn) + noise.normal() / Math.sqrt(2 * gamma);
      const q = aI * Math.sin(turn) + aQ * Math.cos(turn) + noise.normal() / Math.sqrt(2 * gamma);
      const length = Math.hypot(i, q) ** power;
      num += sign * length * Math.cos(power * Math.atan2(q, i));
      den += length;
    }
    return num / den;
  });
  const mean = values.reduce((sum, value) => sum + value, 0) / blocks;
  return { mean, deviation: Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / blocks) };
}
