import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import { samplePlan } from '../sample-plan';
import { afterRemedy, carrierFinding, clockFinding, findingsAbout } from './verdicts';

const slug = 'resolution.integrator-dead-band';

describe(slug, () => {
  it('passes the sample link, whose increments are never less than one LSB', () => {
    expect(carrierFinding(slug)).toMatchObject({ severity: 'pass', value: 0 });
    expect(clockFinding(slug)).toMatchObject({ severity: 'pass', value: 0 });
  });

  // Published: with 12 bits below one radian per update at BnT 0.005 the integrator never moves. Here 12 NCO bits are
  // 2^−12 turns, and one error bit besides its sign.
  it('fails an integrator that never moves', () => {
    const parts = {
      carrier: {
        stages: [{ name: 'track', noiseBandwidth: 0.0005 }],
        nco: { widthBits: 12, phaseBits: 12 },
        arithmetic: { errorBits: 8, guardBits: 0, integratorBits: 12 },
      },
    };
    const finding = carrierFinding(slug, parts);
    expect(finding).toMatchObject({ severity: 'fail', title: 'Carrier loop: the integrator never moves' });
  });

  it('cautions when only noise would move it, unless the noise does', () => {
    const carrier = {
      stages: [{ name: 'track', noiseBandwidth: 0.005 }],
      nco: { widthBits: 20, phaseBits: 12 },
      arithmetic: { guardBits: 0, integratorBits: 30 },
    };
    const quiet = { signal: { esN0Db: 60 }, environment: { carrierTolerancePpm: 1 }, carrier };
    const finding = carrierFinding(slug, quiet);
    expect(finding.severity).toBe('caution');
    expect(carrierFinding(slug, { carrier }).severity).toBe('pass');
    expect(finding.change!.pointer).toBe('/carrier/arithmetic/guardBits');
    expect(afterRemedy(finding, quiet).severity).toBe('pass');
  });

  // By hand: floor takes half an LSB off every increment, so the loop rests where d·M·2^−s = ½, that is at half of
  // the band. A replay of such words at 10 dB settled 1.92° off, where 1.94° are said.
  it('reports the pull of floor, which no noise takes away', () => {
    const carrier = {
      stages: [{ name: 'track', noiseBandwidth: 0.005 }],
      nco: { widthBits: 20, phaseBits: 12 },
      arithmetic: { guardBits: 0, integratorBits: 30, rounding: 'floor', errorBits: 16 },
    };
    const finding = carrierFinding(slug, { carrier });
    expect(finding).toMatchObject({ severity: 'caution', title: 'Carrier loop: rounding pulls the integrator' });
    const { words } = workOut(samplePlan({ carrier, clock: undefined })).carrier!;
    const { mantissa, shift } = words.stages[0]!.integral;
    const standing = (2 ** (shift - 1) / mantissa) * (2 ** -14 / 1.387957082) * (180 / Math.PI);
    expect(finding.value! / standing).toBeCloseTo(1, 2);
    expect(afterRemedy(finding, { carrier }).severity).toBe('pass');
  });

  it('adds guard bits enough for an integrator that never moves', () => {
    const parts = {
      carrier: {
        stages: [{ name: 'track', noiseBandwidth: 0.0005 }],
        arithmetic: { errorBits: 6, guardBits: 0, integratorBits: 32 },
        nco: { widthBits: 14, phaseBits: 12 },
      },
    };
    const finding = carrierFinding(slug, parts);
    expect(finding.title).toBe('Carrier loop: the integrator never moves');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('is a matter of loops with an integrator', () => {
    expect(findingsAbout(slug, { clock: undefined, carrier: { order: 1 } })).toEqual([]);
  });
});

describe('resolution.spur', () => {
  // Published (H. Nicholas, H. Samueli 1987): the images of the first 2^P lines, 20·log10(2^P − 1) down.
  it.each([
    [12, 'pass'],
    [4, 'caution'],
  ])('with %i phase bits is a %s', (phaseBits, severity) => {
    const parts = { carrier: { nco: { phaseBits } } };
    const finding = carrierFinding('resolution.spur', parts);
    expect(finding).toMatchObject({ severity, limit: -30, unit: 'dBc' });
    expect(finding.value).toBeCloseTo(-20 * Math.log10(2 ** phaseBits - 1), 4);
    if (severity === 'caution') expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('resolution.frequency', () => {
  it('passes 32 bits', () => {
    expect(findingsAbout('resolution.frequency').map(({ severity }) => severity)).toEqual(['pass', 'pass']);
  });

  // By hand: one LSB of 12 bits is 360/4096°, and g1 = 300/11401 turns it into 3.34° of phase.
  it('fails an NCO whose step is worth more than the jitter limit, and types one that is fine', () => {
    const carrier = {
      delay: 0,
      stages: [{ name: 'track', noiseBandwidth: 0.01 }],
      nco: { widthBits: 12, phaseBits: 12 },
      arithmetic: { integratorBits: 24 },
    };
    const finding = carrierFinding('resolution.frequency', { carrier });
    expect(finding).toMatchObject({ severity: 'fail', limit: 0.3, change: { value: 16, label: 'Set 2.8 to 16 bits' } });
    expect(finding.value).toBeCloseTo((360 / 4096 / 300) * 11401, 6);
    expect(afterRemedy(finding, { carrier }).severity).toBe('pass');
  });
});
