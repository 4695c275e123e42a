import { describe, expect, it } from 'vitest';
import {
  isQuantity,
  quantitiesOf,
  quantityAt,
  quantityList,
  stageOf,
  widthOf,
} from '../../../shared/registers/quantities';
import { carrierWords, design, plan } from '../files/fixture';

const byPath = new Map(quantitiesOf({ plan, design }).map((quantity) => [quantity.path, quantity]));
const valueAt = (path: string) => byPath.get(path)?.value;

describe('quantitiesOf', () => {
  it('reads the integers of the words', () => {
    expect(valueAt('carrier.acquire.integral.mantissa')).toBe(-547n);
    expect(valueAt('carrier.track.proportional.shift')).toBe(12n);
    expect(valueAt('carrier.acquire.untilSymbols')).toBe(4000n);
    expect(valueAt('carrier.acquire.lockThreshold')).toBe(153n);
    expect(valueAt('carrier.nco.fcw')).toBe(4294967295n);
    expect(valueAt('clock.counter.nominalStep')).toBe(2147483648n);
    expect(valueAt('carrier.delay')).toBe(3n);
  });

  it('numbers choices by their place in the list', () => {
    expect(byPath.get('carrier.rounding')).toMatchObject({ value: 2n, choice: 'convergent' });
    expect(byPath.get('carrier.overflow.increment')).toMatchObject({ value: 1n, choice: 'wrap' });
    expect(byPath.get('clock.interpolator')).toMatchObject({ value: 2n, choice: 'cubic' });
  });

  // A limit of 0 would hold the integrator at 0; 2^39 − 1 is the largest value of 40 bits.
  it('gives full scale where a plan sets no limit', () => {
    expect(valueAt('clock.integratorLimit')).toBe(549755813887n);
    expect(byPath.get('clock.integratorLimited')?.choice).toBe('off');
  });

  it('keeps every bit of a 64-bit word', () => {
    const wide = { ...carrierWords, nco: { ...carrierWords.nco, widthBits: 64, fcw: '18446744073709551615' } };
    const [quantity] = quantitiesOf({
      plan,
      design: { carrier: { ...design.carrier!, words: wide } },
    }).filter(({ path }) => path === 'carrier.nco.fcw');
    expect(quantity?.value).toBe(2n ** 64n - 1n);
    expect(quantity?.widthBits).toBe(64);
  });

  it('reads only the loops that the plan has', () => {
    const paths = quantitiesOf({ plan, design: { clock: design.clock! } }).map(({ path }) => path);
    expect(paths.every((path) => path.startsWith('clock.'))).toBe(true);
  });

  // 2^32 − 1 is −1 in two's complement: −27.5e6/2^32 Hz = −0.0064028… Hz. 9995560252·27.5e6/2^40 = 249999.99999 Hz.
  it('says what a word means in Hz', () => {
    expect(byPath.get('carrier.nco.fcw')?.meaning).toBe('−0.00640284 Hz');
    expect(byPath.get('carrier.integratorLimit')?.meaning).toBe('±250000 Hz');
    expect(byPath.get('clock.counter.nominalStep')?.meaning).toBe('2 samples per symbol');
  });

  // The fixture's wanted gains are those of the acquire words exactly; track wants 0.25·2^−10 and has 1023·2^−12.
  // By hand: 801·2^3 = 6408, and −547·2^6 = −35008 with 8 guard bits: −35008/2^8 = −136.75.
  it('says which way a shift goes, and what a loop of this order leaves unused', () => {
    expect(byPath.get('carrier.acquire.proportional.shift')?.meaning).toBe('left by 3');
    expect(byPath.get('carrier.track.proportional.shift')?.meaning).toBe('right by 12');
    expect(byPath.get('carrier.acquire.integral2.mantissa')?.meaning).toBe('0: unused in a loop of order 2');
  });

  it('gives the scales that turn a word into a quantity', () => {
    for (const path of ['carrier.sampleFullScaleLog2', 'carrier.nco.tableBits', 'clock.counter.tableBits']) {
      expect(byPath.has(path), path).toBe(true);
      expect(isQuantity(path), path).toBe(true);
    }
  });

  it('gives the error of a gain word against the wanted gain', () => {
    expect(byPath.get('carrier.acquire.proportional.mantissa')?.meaning).toBe(
      '6408 output LSB per error LSB, 0 % from the wanted gain',
    );
    expect(byPath.get('carrier.acquire.integral.mantissa')?.meaning).toBe(
      '−35008 integrator LSB per error LSB, that is −136.75 output LSB, 0 % from the wanted gain',
    );
    // 1023·2^−12 / (0.25·2^−10) − 1 = 1022, that is +102200 %, three digits of it.
    expect(byPath.get('carrier.track.proportional.mantissa')?.meaning).toContain('+102000 %');
  });

  it('has no path twice', () => {
    expect(byPath.size).toBe(quantitiesOf({ plan, design }).length);
  });
});

describe('widthOf', () => {
  it.each([
    [0n, false, 1],
    [0n, true, 1],
    [256n, false, 9],
    [-2048n, true, 12],
    [-2049n, true, 13],
    [2047n, true, 12],
    [2n ** 64n - 1n, false, 64],
    [-(2n ** 63n), true, 64],
  ])('of %d (signed: %s) is %d bits', (value, signed, bits) => {
    expect(widthOf(value, signed)).toBe(bits);
  });
});

describe('paths', () => {
  it('lists what a form can bind, and recognises each', () => {
    const paths = quantityList(['acquire', 'track']).map(({ path }) => path);
    expect(paths).toContain('clock.track.integral2.shift');
    expect(paths.every(isQuantity)).toBe(true);
    expect([...byPath.keys()].every((path) => paths.includes(path))).toBe(true);
  });

  it.each([
    'carrier',
    'carrier.nco',
    'carrier.nco.fcw.x',
    'carrier.Track.untilLock',
    'clock.nco.fcw',
    'carrier.overflow.x',
  ])('knows no %s', (path) => {
    expect(isQuantity(path)).toBe(false);
    expect(quantityAt(path)).toBeUndefined();
  });

  it('takes a stage of any name, even one of a word of the loop', () => {
    expect(quantityAt('carrier.lock.untilSymbols')?.path).toBe('carrier.lock.untilSymbols');
    expect(stageOf('carrier.lock.untilSymbols')).toBe('lock');
    expect(stageOf('carrier.lock.threshold')).toBeUndefined();
  });
});
