import { describe, expect, it } from 'vitest';
import { corvidC1Target } from '../../../seeds/corvid-c1-map';
import { configHeader } from '../../../shared/files/c-header';
import type { TargetSnapshot } from '../../../shared/files/file-input';
import type { CarrierLoop } from '../../../shared/model/plan';
import type { Field, RegisterMap } from '../../../shared/model/register-map';
import { complaints, including, languages, printed } from './compile';
import { carrierWords, design, digest, input, plan, target } from './fixture';
import { written } from './written';

const withMap = (registerMap: RegisterMap, change: Partial<TargetSnapshot> = {}) =>
  input({ target: { ...target, ...change, registerMap } });

const field = (name: string, high: number, low: number, more: Partial<Field> = {}): Field => ({
  name,
  high,
  low,
  ...more,
});

/** 64-bit words, the least mantissa, and both kinds of wide constant. */
const wideWords = {
  ...carrierWords,
  integratorBits: 64,
  integratorLimit: '9223372036854775807',
  nco: { ...carrierWords.nco, widthBits: 64, fcw: '18446744073709551615' },
  stages: carrierWords.stages.map((stage) => ({ ...stage, proportional: { mantissa: -2147483648, shift: 63 } })),
};

const variants = {
  'both loops on the demo board': input(),
  'a release': input({ release: '2.4.0-rc.1' }),
  'a carrier loop only': input({ design: { carrier: design.carrier! } }),
  'a smaller board': input({ target: { ...corvidC1Target, mapNumber: 1 } }),
  'an empty map': withMap({ registers: [] }),
  'a map of status registers': withMap({
    registers: [{ name: 'STATUS', offset: 0, access: 'read-only', fields: [field('lock', 0, 0)] }],
  }),
  'a register without fields': withMap({ registers: [{ name: 'MAGIC', offset: 0, reserved: 0xdeadbeef, fields: [] }] }),
  '8-bit registers': withMap({
    wordBits: 8,
    byteOrder: 'big',
    registers: [
      { name: 'DELAY', offset: 3, reserved: 0x80, fields: [field('d', 6, 0, { quantity: 'carrier.delay' })] },
    ],
  }),
  'addresses beyond 32 bits': withMap(target.registerMap, { baseAddress: '0x4A0010000' }),
  '64-bit words without a register': input({
    design: { carrier: { ...design.carrier!, words: wideWords } },
    target: { ...target, registerMap: { registers: [] } },
  }),
};

describe('configHeader', () => {
  describe.each(Object.entries(variants))('of %s', (_, variant) => {
    it.each(languages)('compiles as %s without a warning', (language) => {
      expect(complaints({ 'config.h': configHeader(variant) }, including('config.h', 'config.h'), language)).toBe('');
    });
  });

  // 80 characters is the longest name that a plan may have.
  it.each([
    '*/ #error out /*',
    '/* */ /* */',
    '*'.repeat(40) + '/'.repeat(40),
    "??/ ??= ??' what??? ",
    'ends with a backslash \\',
    '"quoted" \\" %s %: <: :>',
    'line one\n#error two\r\n#error three\u2028#error four',
    'Träger ζ = 1/√2, ω₀ µs ±20 ppm – “Ørsted” ½ 東京 🚀',
    '＊／ fullwidth ＼ ＂',
  ])('takes the name %j in comments and strings', (planName) => {
    const named = configHeader(input({ planName, release: planName, target: { ...target, name: planName } }));
    expect(/^[\x20-\x7e\n]*$/.test(named)).toBe(true);
    for (const language of languages) {
      expect(complaints({ 'config.h': named }, including('config.h'), language)).toBe('');
    }
  });

  it('spells Greek letters and drops accents', () => {
    expect(configHeader(input({ planName: 'Träger ζ ±20 µs “a” × 3°' }))).toContain(
      '#define CVD_PLAN        "Trager zeta +/-20 us \'a\' x 3 deg"',
    );
  });

  it('writes the words worked out by hand, in their order', () => {
    const lines = printed(
      { 'config.h': configHeader(input()) },
      `#include <stdio.h>
       #include "config.h"
       int main(void) {
         unsigned i;
         for (i = 0; i < CVD_WRITE_COUNT; i++)
           printf("%lx %lx\\n", (unsigned long)cvd_write_table[i].offset, (unsigned long)cvd_write_table[i].value);
         return 0;
       }`,
    );
    expect(lines).toEqual(written.map(([, offset, word]) => `${offset.toString(16)} ${word.toString(16)}`));
  });

  it('puts a field together again from its macros', () => {
    const [line] = printed(
      { 'config.h': configHeader(input()) },
      `#include <stdio.h>
       #include "config.h"
       int main(void) {
         uint32_t word = (CVD_CAR_GAIN_ACQ_VALUE & CVD_CAR_GAIN_ACQ_MANTISSA_I_MASK) >> CVD_CAR_GAIN_ACQ_MANTISSA_I_SHIFT;
         printf("%ld %d %lx %lx\\n", (long)word - 65536, word == CVD_CAR_GAIN_ACQ_MANTISSA_I_VALUE,
           (unsigned long)CVD_CAR_LIMIT_ADDR, (unsigned long)CVD_LOCK_DET_RESET);
         return 0;
       }`,
    );
    expect(line).toBe('-547 1 40014018 99');
  });

  it('gives every word as a macro, whether or not a register holds it', () => {
    const lines = printed(
      { 'config.h': configHeader(variants['64-bit words without a register']) },
      `#include <stdio.h>
       #include "config.h"
       int main(void) {
         printf("%llu\\n%llu\\n", (unsigned long long)CVD_WORD_CARRIER_NCO_FCW,
           (unsigned long long)CVD_WORD_CARRIER_INTEGRATOR_LIMIT);
         printf("%lld\\n%d\\n", (long long)CVD_WORD_CARRIER_TRACK_PROPORTIONAL_MANTISSA,
           (int)CVD_WORD_CARRIER_ACQUIRE_INTEGRAL_SHIFT);
         printf("%u\\n%s\\n", (unsigned)CVD_MAP_VERSION, CVD_DIGEST);
         return 0;
       }`,
    );
    expect(lines).toEqual(['18446744073709551615', '9223372036854775807', '-2147483648', '-6', '6', digest]);
  });

  it('gives a status register an address and no value', () => {
    const header = configHeader(variants['a map of status registers']);
    expect(header).toContain('CVD_STATUS_ADDR   UINT32_C(0x40010000)');
    expect(header).not.toContain('CVD_STATUS_VALUE');
    expect(header).toContain('#define CVD_WRITE_COUNT UINT32_C(0)');
  });

  it('refuses to compile where a word does not fit its field', () => {
    const narrow = withMap({
      registers: [
        { name: 'CAR_LIMIT', offset: 0, fields: [field('limit', 31, 0, { quantity: 'carrier.integratorLimit' })] },
      ],
    });
    expect(complaints({ 'config.h': configHeader(narrow) }, including('config.h'))).toContain(
      'CAR_LIMIT.limit cannot hold carrier.integratorLimit',
    );
  });

  it('catches a value that was edited by hand, where the language has static assertions', () => {
    const edited = configHeader(input()).replace(/(CAR_GAIN_TRK_VALUE +)UINT32_C\(0xF80103FF\)/, '$1UINT32_C(0x1)');
    expect(edited).not.toBe(configHeader(input()));
    expect(complaints({ 'config.h': edited }, including('config.h'), 'c11')).toContain('CAR_GAIN_TRK');
  });

  it('does not let two headers of one target pass in one file', () => {
    const other = configHeader(input({ digest: 'a'.repeat(64) }));
    const both = { 'config.h': configHeader(input()), 'other.h': other };
    expect(complaints(both, including('config.h', 'other.h'))).toContain('CVD_DIGEST');
  });

  it('is the same to the byte whatever the order of the keys', () => {
    const shuffled = {
      ...plan,
      carrier: Object.fromEntries(Object.entries(plan.carrier!).reverse()) as CarrierLoop,
    };
    expect(configHeader(input({ plan: shuffled }))).toBe(configHeader(input()));
  });

  // Directions and scales are those of the datapath: rs(d·M, s) shifts right, acc lies guard bits below the output,
  // a leading input and an early strobe are positive, the counter steps by step0 − v.
  it.each([
    'Gain: mantissa * 2^-shift, the product rounded once; a shift above 0 goes to the right,',
    'one below 0 to the left.',
    'Output: proportional path + (integrator >> guard bits).',
    'the input leads or the strobe is early.',
    'Clock: the counter steps down by its nominal step - output, so a larger output strobes',
    'Polarity: the signs of the mantissas carry it already; negate nothing twice.',
  ])('tells firmware how to apply the words: %s', (line) => {
    expect(configHeader(input())).toContain(` * ${line}\n`);
  });

  it('names the signal that the gains are for', () => {
    expect(configHeader(input())).toContain(' *   Signal: QPSK, 27500000 Bd, amplitude 1, Es/N0 10 dB\n');
  });

  it('warns of a stage that is unstable', () => {
    const [acquire, ...others] = design.carrier!.stages;
    const unstable = { ...design.carrier!, stages: [{ ...acquire!, stable: false }, ...others] };
    const text = configHeader(input({ design: { carrier: unstable } }));
    expect(text.match(/UNSTABLE/g)).toHaveLength(1);
    expect(text).toContain('Carrier loop, stage acquire\n *   UNSTABLE with its delay');
  });

  it('says where it comes from and what must be done before use', () => {
    const header = configHeader(input({ release: '2.4.0' }));
    for (const text of ['Product: Keepstep', 'Engine: 1.0.0', 'Revision: 14', 'Release: 2.4.0', `sha256 ${digest}`]) {
      expect(header).toContain(` * ${text.replace('sha256', 'Digest: sha256')}`);
    }
    expect(header).toContain('Corvid C2, register map 6');
    expect(header).toContain('Verify on the real hardware before fielding.');
  });
});
