import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import { workOut } from '../../shared/design';
import type { StageDesign } from '../../shared/model/design';
import { planFields } from '../../shared/plan/fields';
import { samplePlan } from './sample-plan';

const design = workOut(samplePlan());
const exact = workOut(samplePlan({ carrier: { method: 'exact' } }));
const stagesOf = ({ carrier }: typeof design): StageDesign[] => carrier!.stages;

const schemaAt = (name: string): object =>
  JSON.parse(readFileSync(new URL(`../../schemas/${name}.schema.json`, import.meta.url), 'utf8')) as object;
const validate = new Ajv2020({ strict: false })
  .addSchema(schemaAt('plan'))
  .addSchema(schemaAt('words'))
  .compile(schemaAt('design'));

/** Relative agreement. */
const near = (value: number | null, expected: number, tolerance: number): void =>
  expect(Math.abs((value as number) / expected - 1)).toBeLessThan(tolerance);

/**
 * QPSK 27.5 MBd, sign detector, ζ = 1/√2, BnT 0.01 and 0.004, three updates of delay, 32-bit NCO. Independent values,
 * worked out with numpy and scipy: the difference equations run and ½Σh² summed, poles of the expanded polynomial,
 * noise integrated over its density, the nearest word of every shift tried.
 */
describe('workOut of the satellite link', () => {
  it.each([
    [0, 300 / 11401, 4 / 11401, 0.011102252242170457, 0.7070761282348],
    [1, 0.010609929479335395, 5.6586290556455445e-5, 0.0041684057482631555, 0.7071051181648],
  ])('has the nominal gains, bandwidth and damping of stage %i', (i, g1, g2, bandwidth, damping) => {
    const stage = stagesOf(design)[i]!;
    near(stage.gains.g1, g1, 1e-12);
    near(stage.gains.g2, g2, 1e-12);
    near(stage.noiseBandwidth.exact, bandwidth, 1e-9);
    near(stage.noiseBandwidthHz.exact, 27.5e6 * bandwidth, 1e-9);
    near(stage.damping.exact, damping, 1e-9);
  });

  it.each([
    [0, 0.02396086471740722, 0.0002905466265514185, 0.01],
    [1, 0.010199873114252234, 5.22858340310947e-5, 0.004],
  ])('has the exact gains of stage %i', (i, g1, g2, bandwidth) => {
    const stage = stagesOf(exact)[i]!;
    near(stage.gains.g1, g1, 1e-8);
    near(stage.gains.g2, g2, 1e-8);
    near(stage.noiseBandwidth.exact, bandwidth, 1e-9);
    near(stage.damping.exact, Math.SQRT1_2, 1e-9);
  });

  it('has the slope, the variance and the oscillator gain of its detector', () => {
    const { gain, variance, oscillatorGain, gainWithoutNoise } = design.carrier!.detector;
    near(gain, 1.3879570818133846, 1e-9);
    near(variance, 0.09973063973870189, 1e-9);
    near(oscillatorGain, (2 * Math.PI) / 2 ** 32, 1e-15);
    near(gainWithoutNoise, Math.SQRT2, 1e-15);
  });

  it.each([
    [design, 0, [1582, -3], [1350, -5], 0.01110260444936049, 0.7070812474242],
    [design, 1, [1276, -2], [1742, -2], 0.0041689020488883954, 0.7072194620292],
    [exact, 0, [1441, -3], [1118, -5], 0.01000156259311345, 0.7073398823455],
    [exact, 1, [1226, -2], [1609, -2], 0.003999161021604537, 0.7069510077137],
  ])('has the words and what they make, %#', (from, i, proportional, integral, bandwidth, damping) => {
    const { words, noiseBandwidth, damping: damped, bandwidthError } = stagesOf(from)[i]!;
    expect([words.proportional.mantissa, words.proportional.shift]).toEqual(proportional);
    expect([words.integral?.mantissa, words.integral?.shift]).toEqual(integral);
    near(noiseBandwidth.effective, bandwidth, 1e-9);
    near(damped.effective, damping, 1e-9);
    expect(bandwidthError).toBeCloseTo(bandwidth / noiseBandwidth.exact! - 1, 9);
  });

  it.each([
    [design, 0, 59.69502567151389, 16.482622279089558],
    [design, 1, 63.18650899500693, 41.52384231414515],
    [exact, 0, 60.22096531711745, 18.144564547693516],
  ])('has the margins, %#', (from, i, degrees, ratio) => {
    const { margins } = stagesOf(from)[i]!;
    near(margins.phaseDeg, degrees, 1e-9);
    near(margins.gainUp, ratio, 1e-8);
    expect(margins.gainDown).toBeNull();
  });

  // Poles nearest to z = 1 through s = 2(z − 1)/(z + 1); |H| searched on four million frequencies; the step run.
  it.each([
    [0, 86177.76712524201, 2.3372633858147203, 185487.04367109502, 251, 0.22970229244694296],
    [1, 33560.43504238398, 2.183000385919406, 70270.44120287555, 641, 0.21599899514121756],
  ])('has the frequencies and the step of stage %i', (i, natural, peaking, bandwidth, settling, overshoot) => {
    const stage = stagesOf(design)[i]!;
    near(stage.naturalFrequencyHz.exact, natural, 1e-9);
    near(stage.peakingDb, peaking, 1e-9);
    near(stage.bandwidth3DbHz, bandwidth, 1e-9);
    expect(stage.settlingUpdates).toBe(settling);
    near(stage.overshoot, overshoot, 1e-12);
  });

  // From the words: g1 = 1582·2^3·2^10·Kd·K0, g2 = 1350·2^5·2^(10 − 8)·Kd·K0, and so on, through the same programs.
  it.each([
    [0, 59.69508763832343, 86180.17667128929, 0.7070812474242454 / 0.7070761282348267 - 1],
    [1, 63.19184630880693, 33562.626380585454, 0.7072194620292431 / 0.7071051181647999 - 1],
  ])('has what the words make of stage %i', (i, margin, natural, dampingError) => {
    const stage = stagesOf(design)[i]!;
    near(stage.effectivePhaseDeg, margin, 1e-9);
    near(stage.naturalFrequencyHz.effective, natural, 1e-9);
    expect(stage.dampingError).toBeCloseTo(dampingError, 9);
  });

  it('has the jitter of both stages, and the bandwidth with the least', () => {
    const { stages, best } = design.carrier!.budget!;
    near(stages[0]!.thermal, 1.9425913057143722, 1e-8);
    near(stages[0]!.oscillator, 1.3594136819534177, 1e-4);
    // By hand: 12 phase bits, 360°/2^12/√12, and tables of 12 bits, 2^−10/√12 rad.
    const phaseBits = Math.hypot(0.0253718, 0.0161531);
    near(stages[1]!.phaseQuantisation, phaseBits, 1e-4);
    near(stages[1]!.total, Math.hypot(1.9613269097045651, phaseBits), 1e-4);
    near(best!.noiseBandwidth, 0.003431180230112621, 1e-3);
    near(best!.total, Math.hypot(1.9531250649394507, phaseBits), 1e-4);
  });

  it('has the clock loop', () => {
    const [acquire, track] = design.clock!.stages as [StageDesign, StageDesign];
    near(design.clock!.detector.gain, 1.0780112231405778, 1e-12);
    near(acquire.gains.g1, 0.005319130074006831, 1e-12);
    near(acquire.noiseBandwidth.exact, 0.002041484594006098, 1e-9);
    expect(acquire.words).toEqual({
      proportional: { mantissa: 1293, shift: -3 },
      integral: { mantissa: 1766, shift: -2 },
    });
    near(track.noiseBandwidth.exact, 0.0005025647431486491, 1e-9);
    near(design.clock!.resolutionHz, (2 * 27.5e6) / 2 ** 32, 1e-12); // two steps a symbol, one LSB of 32 bits
    expect(track.words).toEqual({
      proportional: { mantissa: 1296, shift: -1 },
      integral: { mantissa: 1770, shift: 2 },
    });
  });

  it('has its offsets', () => {
    const { unambiguousHz, falseLockSpacingHz, offsetHz } = design.carrier!.acquisition;
    expect([unambiguousHz, falseLockSpacingHz]).toEqual([3_437_500, 6_875_000]);
    expect(offsetHz).toBeCloseTo(77_500, 6);
    near(design.carrier!.resolutionHz, 27.5e6 / 2 ** 32, 1e-12);
  });
});

describe('workOut', () => {
  it('gives what the schema of a design describes', () => {
    for (const parts of [
      {},
      { clock: undefined },
      { carrier: undefined },
      { carrier: { order: 3 } },
      { carrier: { order: 1 } },
    ]) {
      const valid = validate({ ...workOut(samplePlan(parts)), digest: '0'.repeat(64) });
      expect(validate.errors ?? []).toEqual([]);
      expect(valid).toBe(true);
    }
  });

  it('gives the same design twice, and leaves the plan alone', () => {
    const plan = samplePlan();
    const before = structuredClone(plan);
    expect(workOut(plan)).toEqual(workOut(plan));
    expect(plan).toEqual(before);
  });

  it('counts the U errors that are added, in slope and oscillator gain', () => {
    const { detector, updateRateHz, stages } = workOut(samplePlan({ carrier: { updateInterval: 4 } })).carrier!;
    near(detector.gain, 4 * 1.3879570818133846, 1e-9);
    near(detector.oscillatorGain, (8 * Math.PI) / 2 ** 32, 1e-12);
    expect(updateRateHz).toBe(27.5e6 / 4);
    near(stages[1]!.noiseBandwidthHz.wanted, 110e3, 1e-12);
  });

  it('makes the same loop with a negated polarity', () => {
    const turned = workOut(samplePlan({ carrier: { polarity: -1 } })).carrier!.stages[0]!;
    expect(turned.words.proportional.mantissa).toBe(-1582);
    near(turned.noiseBandwidth.effective, 0.01110260444936049, 1e-9);
  });

  it('works out an unstable loop as far as it goes', () => {
    const [stage] = workOut(samplePlan({ carrier: { delay: 60, stages: [{ name: 'a', noiseBandwidth: 0.05 }] } }))
      .carrier!.stages;
    expect(stage).toMatchObject({
      stable: false,
      peakingDb: null,
      settlingUpdates: null,
      phaseStep: { updates: [], phase: [] },
    });
    expect(stage!.noiseBandwidth.exact).toBeNull();
    expect(stage!.largestDelay).toBe(7);
  });

  it('needs a limit to be at least one integrator LSB', () => {
    const parts = { carrier: { arithmetic: { integratorLimitHz: 1e-6 } } };
    const fault = expect.objectContaining({ parameter: '/carrier/arithmetic/integratorLimitHz' });
    expect(() => workOut(samplePlan(parts))).toThrow(fault);
  });
});

describe('findings', () => {
  const rank = ['fail', 'caution', 'pass'];

  it('stand failing first, then caution, then pass', () => {
    const { findings } = workOut(samplePlan({ carrier: { arithmetic: { integratorLimitHz: 70e3 } } }));
    const order = findings.map(({ severity }) => rank.indexOf(severity));
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(findings[0]!.slug).toBe('acquisition.integrator-range');
  });

  it('are titled in at most seven words, and point at numbered fields', () => {
    for (const finding of [...design.findings, ...exact.findings]) {
      expect(finding.title.split(/\s+/).length).toBeLessThanOrEqual(7);
      for (const pointer of finding.fields) {
        const pattern = pointer.replace(/\/stages\/\d+/, '/stages/*');
        expect(planFields.map((field) => field.pointer)).toContain(pattern);
      }
    }
  });

  // The fonts of the sheet hold latin and Greek only.
  it('use no character that the sheet cannot show', () => {
    for (const { title, reason, remedy, source } of design.findings) {
      expect(`${title}${reason}${remedy}${source}`).not.toMatch(/[≤≥√→≈∞⁻]/);
    }
  });
});
