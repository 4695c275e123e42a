import { describe, expect, it } from 'vitest';
import { parseQuantity, type FieldOfQuantity } from '../../../shared/quantities/parse';

const value = (text: string, field: FieldOfQuantity) => {
  const reading = parseQuantity(text, field);
  return reading.kind === 'value' ? reading.value : reading;
};

// Prefixes by the SI brochure (9th edition, table 7); 1 ppm = 1e-6. Powers of ten are exact in these readings.
describe('parseQuantity', () => {
  const rate: FieldOfQuantity = { unit: 'Bd' };
  const carrier = { value: 1.55e9, unit: 'Hz' } as const;
  const tolerance: FieldOfQuantity = { unit: 'ppm', symmetric: true, reference: carrier };

  it.each<[string, FieldOfQuantity, number]>([
    ['27.5 MBd', rate, 27.5e6],
    ['27500 k', rate, 27.5e6],
    ['27,5 MBd', rate, 27.5e6],
    ['27.5MBd', rate, 27.5e6],
    ['38.4 kBd', rate, 38_400],
    ['38.4 kbaud', rate, 38_400],
    ['27500000', rate, 27.5e6],
    ['2.75e7', rate, 27.5e6],
    ['2.75e1 MBd', rate, 27.5e6],
    ['27 500 000', rate, 27.5e6],
    ['27\u202f500\u202f000', rate, 27.5e6],
    ['27,500,000', rate, 27.5e6],
    ['1.234.567,5', rate, 1_234_567.5],
    ['1,234,567.5', rate, 1_234_567.5],
    ['0,350', { unit: '' }, 0.35],
    ['.35', { unit: '' }, 0.35],
    ['35 %', { unit: '' }, 0.35],
    ['1.0', { unit: '%' }, 0.01],
    ['\u2212114', { unit: 'dBc/Hz' }, -114],
    ['\u2013114 dBc', { unit: 'dBc/Hz' }, -114],
    ['+6.5 dB', { unit: 'dB' }, 6.5],
    ['±20 ppm', tolerance, 20],
    ['+/-20', tolerance, 20],
    ['200 ppb', tolerance, 0.2],
    ['3°', { unit: '° rms' }, 3],
    ['5 deg', { unit: '°' }, 5],
    ['5 degrees', { unit: '°' }, 5],
    ['550 Bd', { unit: 'ppm', reference: { value: 27.5e6, unit: 'Bd' } }, 20],
    ['2.4 GHz', { unit: 'Hz' }, 2.4e9],
    ['1.2 MBd', rate, 1.2e6],
    ['12 mHz', { unit: 'Hz' }, 0.012],
    ['300 µHz', { unit: 'Hz' }, 0.0003],
    ['300 \u03bcHz', { unit: 'Hz' }, 0.0003],
    ['10 k', { unit: 'symbols' }, 10_000],
    ['10000 symbols', { unit: 'symbols' }, 10_000],
    ['1 ghz', { unit: 'Hz' }, 1e9],
  ])('reads %s', (text, field, expected) => {
    expect(value(text, field)).toBe(expected);
  });

  it('takes a number typed alone in the unit on the screen', () => {
    expect(value('28', { unit: 'Bd', shownExponent: 6 })).toBe(28e6);
  });

  // 20 kHz / 1.55 GHz = 12.903226e-6; 20 kHz / 27.5 MBd = 1/1375.
  it('refers a frequency to the carrier or to the symbol rate', () => {
    expect(value('20 kHz', tolerance)).toBeCloseTo(12.9032258, 6);
    expect(value('20 kHz', { unit: '', reference: { value: 27.5e6, unit: 'Bd' } })).toBeCloseTo(1 / 1375, 15);
    expect(parseQuantity('20 kHz', tolerance)).toHaveProperty('text', '±12.903 ppm of 1.55 GHz');
  });

  it('refers ppm to the carrier in a field of Hz, and seconds to the symbol rate', () => {
    expect(value('50 ppm', { unit: 'Hz', reference: carrier })).toBeCloseTo(77_500, 6);
    expect(value('300 µs', { unit: 'symbols', reference: { value: 27.5e6, unit: 'Bd' } })).toBeCloseTo(8250, 6);
  });

  // 1 rad = 180/π degrees = 57.295780 by the SI brochure.
  it('holds all of a radian and says five digits of it', () => {
    expect(value('0.1 rad', { unit: '°' })).toBeCloseTo(5.7295779513, 10);
    expect(parseQuantity('0.1 rad', { unit: '°' })).toHaveProperty('text', '5.7296°');
  });

  it.each(['1,234', '1,234 MBd', '999,000'])('asks which reading of %s is meant', (text) => {
    expect(parseQuantity(text, rate)).toMatchObject({ kind: 'doubt' });
  });

  it.each(['5 mhz', '5 m'])('asks whether %s is milli or mega', (text) => {
    expect(parseQuantity(text, { unit: 'Hz' })).toMatchObject({ kind: 'doubt' });
  });

  it.each<[string, FieldOfQuantity, RegExp]>([
    ['27.5 MHz', rate, /MHz is a frequency; this field takes Bd/],
    ['20 kHz', { unit: 'ppm' }, /kHz is a frequency; this field takes ppm/],
    ['3 dB', { unit: '' }, /dB is a level; this field takes a plain number/],
    ['12 furlongs', rate, /not a unit/],
    ['seven', rate, /not a number/],
    ['1 2', rate, /does not read as one number/],
    ['1.2.3', rate, /does not read as one number/],
    ['±3', rate, /one value/],
    ['-20 ppm', tolerance, /magnitude/],
    ['2.5', { unit: 'bits', integer: true }, /whole number/],
    ['20 kBd', tolerance, /kBd is a symbol rate; this field takes ppm/],
    ['20 kBd', { unit: '', reference: { value: 27.5e6, unit: 'Bd' } }, /kBd is a symbol rate/],
    ['1e999', rate, /out of every range/],
  ])('refuses %s', (text, field, reason) => {
    const reading = parseQuantity(text, field);
    expect(reading).toMatchObject({ kind: 'refused', reason: expect.stringMatching(reason) });
  });

  it('says that an empty field is empty', () => {
    expect(parseQuantity('  ', rate)).toEqual({ kind: 'empty' });
  });

  it('has no negative zero', () => {
    expect(value('-0', { unit: 'Hz' })).toBe(0);
  });
});
