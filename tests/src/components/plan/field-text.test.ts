import { describe, expect, it } from 'vitest';
import { fieldLabel, fieldText } from '../../../../src/components/plan/field-text';
import { lookOf, rangeOf } from '../../../../src/components/plan/field-looks';
import { planFields } from '../../../../shared/plan/fields';
import { plan } from '../../support/plan';

describe('fieldText', () => {
  it.each([
    ['/signal/symbolRateBd', 27.5e6, '27.5 MBd'],
    ['/signal/sampleFullScaleLog2', 1, '±2'],
    ['/carrier/arithmetic/errorFullScaleLog2', -1, '±0.5'],
    ['/carrier/arithmetic/integratorLimitHz', 250e3, '±250 kHz'],
    ['/carrier/arithmetic/integratorLimitHz', undefined, 'none'],
    ['/carrier/detector', 'decision', 'Decision-directed'],
    ['/carrier/stages/0/damping', Math.SQRT1_2, '0.7071'],
    ['/carrier/delay', 1, '1 update'],
    ['/carrier/delay', 3, '3 updates'],
    ['/carrier/polarity', -1, '−1'],
    ['/limits/bandwidthError', 0.01, '1.0 %'],
    ['/limits/phaseJitterDeg', 3, '3.0° rms'],
    ['/carrier/arithmetic/overflow', { sample: 'saturate', integrator: 'wrap' }, 'wrap at integrator'],
    ['/name', 'Transponder 17', 'Transponder 17'],
  ])('%s: %o reads %s', (pointer, value, text) => {
    expect(fieldText(pointer, value)).toBe(text);
  });

  it('says stages by name and bandwidth', () => {
    expect(fieldText('/carrier/stages', plan().carrier!.stages)).toBe('acquire 0.01, track 0.004');
  });
});

describe('fieldLabel', () => {
  it('has number, label and stage', () => {
    expect(fieldLabel('/carrier/stages/1/noiseBandwidth', plan())).toEqual({ number: '2.7', label: 'BnT, track' });
    expect(fieldLabel('/clock', plan())).toEqual({ number: undefined, label: 'Clock loop' });
  });
});

describe('lookOf', () => {
  it('knows every field of the sheet: choices have options, the rest are numbers', () => {
    for (const { pointer } of planFields) {
      const { control, options } = lookOf(pointer);
      expect([pointer, control === 'number', options.length === 0 || control !== 'number']).toEqual([
        pointer,
        control === 'number',
        true,
      ]);
      if (control === 'segments') expect([pointer, options.length > 1 && options.length < 4]).toEqual([pointer, true]);
    }
  });

  it('turns a range of powers into numbers', () => {
    expect(rangeOf('/signal/sampleFullScaleLog2')).toEqual({ min: 2 ** -32, max: 2 ** 32 });
  });
});
