import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import KsNumber from '../../../src/components/KsNumber.vue';
import KsWord from '../../../src/components/KsWord.vue';
import { tableText } from '../../../src/components/table-copy';

const cell = (props: Record<string, unknown>) => mount(KsNumber, { props });
const alignment = (wrapper: ReturnType<typeof cell>) => wrapper.attributes('style')?.replace(/[\s;]/g, '');

describe('KsNumber', () => {
  // Characters from the point to the end, counted by hand: ".7071" 5, ".1935e−2" 8, none in 511.
  it.each([
    [{ value: 0.7071, most: 8 }, '0.7071', '--f:5--fm:8'],
    [{ value: 0.011935, significant: 5, exponent: true, most: 8 }, '1.1935e\u22122', '--f:8--fm:8'],
    [{ value: 511, most: 8 }, '511', '--f:0--fm:8'],
    [{ value: -5.5, decimals: 2, most: 3 }, '\u22125.50', '--f:3--fm:3'],
  ])('writes %o on the point of its column', (props, text, style) => {
    const wrapper = cell(props);
    expect(wrapper.text()).toBe(text);
    expect(alignment(wrapper)).toBe(style);
  });

  it('parts thousands by a margin, so that a copy stays one number', () => {
    const wrapper = cell({ value: 2587 });
    expect(wrapper.text()).toBe('2587');
    expect(wrapper.find('.th').exists()).toBe(true);
  });

  it('sets the exponent soft and leaves an absent number empty', () => {
    expect(cell({ value: 1.5e-9, exponent: true }).get('.ex').text()).toBe('e\u22129');
    expect(cell({ value: null }).text()).toBe('');
  });

  it('writes a text as it is', () => {
    expect(cell({ value: '0x0253C825' }).text()).toBe('0x0253C825');
  });
});

describe('KsWord', () => {
  it('shows mantissa times a power of two and nothing behind a zero', () => {
    const word = (mantissa: number, shift: number) => mount(KsWord, { props: { mantissa, shift } }).html();
    expect(word(996, -5)).toContain('996');
    expect(word(996, -5)).toContain('<sup>5</sup>');
    expect(word(996, 5)).toContain('<sup>\u22125</sup>');
    expect(word(0, 0)).not.toContain('sup');
  });
});

describe('tableText', () => {
  const table = document.createElement('table');
  table.innerHTML = `
    <tr><th>Gain<span class="uin">, dB</span></th><th>a, b</th></tr>
    <tr><td>\u22121.1935e\u22122</td><td>2<span class="th"></span>587</td></tr>
    <tr><td>996·2<sup>\u22125</sup></td><td>say "so"</td></tr>`;

  it('gives plain ASCII numbers, parted by tabs', () => {
    expect(tableText(table)).toBe('Gain\ta, b\n-1.1935e-2\t2587\n996·2^-5\tsay "so"\n');
  });

  it('quotes what CSV must quote (RFC 4180)', () => {
    expect(tableText(table, 'csv')).toBe('Gain,"a, b"\n-1.1935e-2,2587\n996·2^-5,"say ""so"""\n');
  });
});
