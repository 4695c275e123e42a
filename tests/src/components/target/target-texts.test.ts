import { describe, expect, it } from 'vitest';
import { addressText } from '../../../../src/components/target/address-text';
import { integerText, parseInteger } from '../../../../src/components/target/integer-text';
import { detailFaults, prefixFor, slugFor } from '../../../../src/components/target/target-details';

describe('parseInteger', () => {
  it.each([
    ['0', 0],
    ['−0', 0],
    ['153', 153],
    ['−63', -63],
    ['-63', -63],
    ['0x4000', 16384],
    ['0X4f', 79],
    ['1 000', 1000],
    ['0xFFFF_FFFF', 4294967295],
  ])('reads %s as %d', (text, value) => {
    expect(parseInteger(text)).toBe(value);
  });

  it.each(['', '-', '1.5', '1e3', '0x', 'fcw', '0xg', '9007199254740992'])('does not read “%s”', (text) => {
    expect(parseInteger(text)).toBeUndefined();
  });
});

describe('integerText', () => {
  it('shows registers in hexadecimal and the rest with a real minus sign', () => {
    expect(integerText(0x4010, 16)).toBe('0x4010');
    expect(integerText(5, 32)).toBe('0x00000005');
    expect(integerText(-6)).toBe('−6');
    expect(integerText(undefined)).toBe('');
  });
});

describe('addressText', () => {
  it('groups the digits from the right', () => {
    expect(addressText('0x40010000')).toBe('0x4001\u202f0000');
    expect(addressText('0x4a0010000')).toBe('0x4\u202fA001\u202f0000');
    expect(addressText('0x0')).toBe('0x0');
  });
});

describe('details of a target', () => {
  it.each([
    ['Corvid C3', 'corvid-c3', 'CORVID_C3_'],
    ['Träger ζ 2', 'trager-2', 'TRAGER_2_'],
    ['4th modem', 'th-modem', 'TH_MODEM_'],
    ['', '', ''],
  ])('follow the name %s', (name, slug, prefix) => {
    expect([slugFor(name), prefixFor(name)]).toEqual([slug, prefix]);
  });

  it('are proposed so that they can be saved, however long the name', () => {
    const name = 'A receiver board of the second generation with a long name';
    const details = {
      name,
      slug: slugFor(name),
      cPrefix: prefixFor(name),
      loopClockHz: 1e8,
      baseAddress: '0x40000000',
    };
    expect(detailFaults(details, [])).toEqual({});
  });

  it('are refused one by one', () => {
    const details = { name: ' ', slug: 'Corvid', cPrefix: 'CVD', loopClockHz: 0, baseAddress: '40010000' };
    expect(Object.keys(detailFaults(details, []))).toEqual(['name', 'slug', 'loopClockHz', 'cPrefix', 'baseAddress']);
    const taken = { name: 'C2', slug: 'corvid-c2', cPrefix: 'CVD_', loopClockHz: 1, baseAddress: '0x0' };
    expect(detailFaults(taken, ['corvid-c2'])).toEqual({ slug: 'Another target is called corvid-c2.' });
  });
});
