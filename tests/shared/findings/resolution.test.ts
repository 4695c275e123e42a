import { describe, expect, it } from 'vitest';
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

  it('is a matter of loops with an integrator', () => {
    expect(findingsAbout(slug, { clock: undefined, carrier: { order: 1 } })).toEqual([]);
  });
});
