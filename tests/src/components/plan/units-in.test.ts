import { mount, type DOMWrapper, type VueWrapper } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { defineComponent, h, nextTick, type Component } from 'vue';
import { planFields } from '../../../../shared/plan/fields';
import { withValue } from '../../../../shared/plan/pointer';
import { lookOf } from '../../../../src/components/plan/field-looks';
import PhaseNoiseTable from '../../../../src/components/plan/PhaseNoiseTable.vue';
import PlanRow from '../../../../src/components/plan/PlanRow.vue';
import RingRatios from '../../../../src/components/plan/RingRatios.vue';
import StageTable from '../../../../src/components/plan/StageTable.vue';
import { provideDraft, type DraftSession } from '../../../../src/composables/use-draft';
import { plan } from '../../support/plan';

type Input = Pick<DOMWrapper<Element>, 'trigger' | 'setValue'>;

let draft: DraftSession;
let wrapper: VueWrapper | undefined;

function on(part: Component, props: Record<string, unknown>, opened = plan(), typed: Record<string, string> = {}) {
  const host = defineComponent(() => {
    draft = provideDraft();
    draft.open(opened, plan(), { basedOn: 14, typed });
    return () => h(part, props);
  });
  wrapper = mount(host, { attachTo: document.body });
}
beforeEach(() => localStorage.clear());
afterEach(() => wrapper?.unmount());

async function type(input: Input, text: string) {
  await input.trigger('focus');
  await input.setValue(text);
}
/** Leaving marks a wrong field at once; the field waits until a press that may come with it has ended. */
async function leave(input: Input) {
  await input.trigger('blur');
  await new Promise((done) => setTimeout(done));
  await nextTick();
}

interface Case {
  pointer: string;
  typed: string;
  /** What the plan then holds. */
  value: number;
  /** What the field says it understood. */
  echo: string;
  /** A unit of another kind, and the words in which it is refused. */
  wrong: string;
  refusal: string;
}
const taking = (pointer: string, typed: string, value: number, echo: string, wrong: string, refusal: string): Case => ({
  ...{ pointer, typed, value, echo, wrong, refusal },
});

// Values by hand: SI prefixes; 1 ppm = 1e-6; 20 kHz of 1.55 GHz are 12.903226 ppm; 50 ppm of 1.55 GHz are 77.5 kHz;
// 20 kHz of 27.5 MBd are 1/1375; 0.1 rad are 5.729578 degrees; log2 4 = 2.
const plain = 'this field takes a plain number';
const each = (loop: 'carrier' | 'clock'): Case[] =>
  (
    [
      ['updateInterval', '4 symbols', 4, '4 symbols', '4 updates', 'number of updates; this field takes symbols'],
      ['delay', '6 updates', 6, '6 updates', '6 symbols', 'number of symbols; this field takes updates'],
      ['thirdOrder/a3', '110 %', 1.1, '1.1', '1.1 dB', plain],
      ['thirdOrder/b3', '2,4', 2.4, '2.4', '2.4 rad', plain],
      ['arithmetic/errorBits', '14 bits', 14, '14 bits', '14 dB', 'level; this field takes bits'],
      ['arithmetic/errorFullScaleLog2', '+/-4', 2, '±4', '4 bits', plain],
      ['arithmetic/mantissaBits', '14 bit', 14, '14 bits', '14 symbols', 'number of symbols; this field takes bits'],
      ['arithmetic/integratorBits', '44 bits', 44, '44 bits', '44 Hz', 'frequency; this field takes bits'],
      ['arithmetic/guardBits', '9 bits', 9, '9 bits', '9 ppm', 'ratio; this field takes bits'],
      ['arithmetic/integrator2Bits', '50 bits', 50, '50 bits', '50 deg', 'angle; this field takes bits'],
      ['arithmetic/guard2Bits', '7 bits', 7, '7 bits', '7 updates', 'number of updates; this field takes bits'],
      ['lockDetector/averagingSymbols', '512 symbols', 512, '512 symbols', '512 bits', 'this field takes symbols'],
      ['lockDetector/threshold', '65 %', 0.65, '0.65', '0.65 dB', plain],
    ] as const
  ).map(([path, typed, value, echo, wrong, refusal]) => taking(`/${loop}/${path}`, typed, value, echo, wrong, refusal));

const rows: Case[] = [
  taking('/signal/symbolRateBd', '1.2 MBd', 1.2e6, '1.2 MBd', '1.2 MHz', 'MHz is a frequency; this field takes Bd'),
  taking('/signal/symbolRateBd', '38.4 kBd', 38_400, '38.4 kBd', '38.4 dB', 'dB is a level; this field takes Bd'),
  taking('/signal/samplesPerSymbol', '4,0', 4, '4', '4 symbols', plain),
  taking('/signal/rollOff', '25 %', 0.25, '0.25', '0.25 dB', plain),
  taking('/signal/esN0Db', '6.5 dB', 6.5, '6.5 dB', '6.5 deg', 'deg is an angle; this field takes dB'),
  taking('/signal/amplitude', '90 %', 0.9, '0.90', '1 dB', plain),
  taking('/signal/amplitudeToleranceDb', '±1.5 dB', 1.5, '±1.5 dB', '1 ppm', 'ppm is a ratio; this field takes dB'),
  taking('/signal/sampleBits', '14 bits', 14, '14 bits', '14 Hz', 'Hz is a frequency; this field takes bits'),
  taking('/signal/sampleFullScaleLog2', '+/-4', 2, '±4', '4 bits', plain),
  ...each('carrier'),
  taking('/carrier/nco/widthBits', '40 bits', 40, '40 bits', '40 symbols', 'this field takes bits'),
  taking('/carrier/nco/phaseBits', '14 bits', 14, '14 bits', '14 deg', 'deg is an angle; this field takes bits'),
  taking('/carrier/nco/tableBits', '14 bits', 14, '14 bits', '14 dB', 'dB is a level; this field takes bits'),
  taking('/carrier/nco/stepsPerSymbol', '4,0', 4, '4', '4 Hz', plain),
  taking('/carrier/nco/centreHz', '2.4 MHz', 2.4e6, '2.4 MHz', '2.4 MBd', 'MBd is a symbol rate; this field takes Hz'),
  taking('/carrier/arithmetic/integratorLimitHz', '50 ppm', 77_500, '±77.5 kHz of 1.55 GHz', '50 dB', 'takes Hz'),
  ...each('clock'),
  taking('/clock/counter/widthBits', '40 bits', 40, '40 bits', '40 symbols', 'this field takes bits'),
  taking('/clock/counter/fractionBits', '9 bits', 9, '9 bits', '9 Hz', 'this field takes bits'),
  taking('/clock/counter/tableBits', '14 bits', 14, '14 bits', '14 dB', 'this field takes bits'),
  taking('/clock/arithmetic/integratorLimitPpm', '±50 ppm', 50, '±50 ppm', '50 dB', 'this field takes ppm'),
  taking('/environment/carrierFrequencyHz', '2.4 GHz', 2.4e9, '2.4 GHz', '2.4 GBd', 'GBd is a symbol rate'),
  taking('/environment/carrierTolerancePpm', '±20 ppm', 20, '±20 ppm', '20 kBd', 'kBd is a symbol rate'),
  taking('/environment/carrierTolerancePpm', '20 kHz', 12.903226, '±12.903 ppm of 1.55 GHz', '20 dB', 'takes ppm'),
  taking('/environment/dopplerHz', '±5 kHz', 5e3, '±5 kHz', '5 kBd', 'kBd is a symbol rate; this field takes Hz'),
  taking('/environment/dopplerRateHzPerS', '1.5 kHz/s', 1500, '1.5 kHz/s', '50 Hz', 'Hz is a frequency'),
  taking('/environment/clockTolerancePpm', '550 Bd', 20, '±20 ppm of 27.5 MBd', '20 deg', 'this field takes ppm'),
  taking('/limits/phaseJitterDeg', '5 deg', 5, '5.0° rms', '5 Hz', 'Hz is a frequency; this field takes °'),
  taking('/limits/phaseJitterDeg', '0.1 rad', 5.729578, '5.7296° rms', '5 dB', 'dB is a level; this field takes °'),
  taking('/limits/timingJitterSymbols', '0.02 symbols', 0.02, '0.020 symbols', '0.02 deg', 'takes symbols'),
  taking('/limits/phaseMarginDeg', '50 deg', 50, '50°', '50 dB', 'dB is a level; this field takes °'),
  taking('/limits/bandwidthError', '2 %', 0.02, '2.0 %', '2 deg', 'deg is an angle; this field takes %'),
  taking('/limits/dampingError', '3 %', 0.03, '3.0 %', '3 dB', 'dB is a level; this field takes %'),
  taking('/limits/acquisitionSymbols', '5 k', 5000, 'symbols', '5 bits', 'this field takes symbols'),
  taking('/limits/implementationLossDb', '0.5 dB', 0.5, '0.50 dB', '0.5 %', '% is a ratio; this field takes dB'),
  taking('/limits/headroomBits', '1 bit', 1, '1 bits', '1 dB', 'dB is a level; this field takes bits'),
];

describe('a number field of the form', () => {
  it('has its cases: none is left out', () => {
    const elsewhere = /stages|phaseNoise|ringRatios/;
    const numbers = planFields.map(({ pointer }) => pointer).filter((pointer) => lookOf(pointer).control === 'number');
    const cased = new Set(rows.map(({ pointer }) => pointer));
    expect(numbers.filter((pointer) => !elsewhere.test(pointer) && !cased.has(pointer))).toEqual([]);
  });

  it.each(rows)('$pointer reads “$typed”', async ({ pointer, typed, value, echo }) => {
    on(PlanRow, { pointer });
    const input = wrapper!.get('input');
    await type(input, typed);
    expect(draft.value(pointer)).toBeCloseTo(value, 5);
    expect(wrapper!.get('.got').text()).toContain(`understood: `);
    expect(wrapper!.get('.got').text()).toContain(echo);
    await leave(input);
    expect(wrapper!.find('.err').exists()).toBe(false);
  });

  it.each(rows)('$pointer refuses “$wrong” at its field', async ({ pointer, wrong, refusal }) => {
    on(PlanRow, { pointer });
    const before = draft.value(pointer);
    const input = wrapper!.get('input');
    await type(input, wrong);
    await leave(input);
    expect(wrapper!.get('.err').text()).toContain(refusal);
    expect(input.attributes('aria-invalid')).toBe('true');
    expect(draft.value(pointer)).toBe(before);
    expect(draft.misread.value).toHaveProperty([pointer]);
  });
});

// The plan holds all that was typed, so the echo must not say less: 0.225 is not 0.23.
describe('the echo', () => {
  it.each([
    ['/signal/rollOff', '0,225', 'understood: 0.225'],
    ['/limits/implementationLossDb', '0,125', 'understood: 0.125 dB'],
    ['/limits/bandwidthError', '0,25 %', 'understood: 0.25 %'],
  ])('rounds nothing: %s', async (pointer, typed, echo) => {
    on(PlanRow, { pointer });
    await type(wrapper!.get('input'), typed);
    expect(wrapper!.get('.got').text()).toBe(echo);
  });
});

describe('the stage table', () => {
  const cells: Case[] = [
    taking('/carrier/stages/1/damping', '80 %', 0.8, '0.8', '0.8 dB', plain),
    taking('/carrier/stages/1/noiseBandwidth', '20 kHz', 1 / 1375, '0.00072727 of 27.5 MBd', '20 kBd', plain),
    taking('/carrier/stages/1/noiseBandwidth', '0.5 %', 0.005, '0.005', '5 deg', plain),
    taking('/carrier/stages/0/until/symbols', '6 k', 6000, 'symbols', '6 bits', 'this field takes symbols'),
    taking('/carrier/stages/0/until/lockMetric', '70 %', 0.7, '0.7', '0.7 dB', plain),
  ];
  const byFrequency = withValue(plan(), '/carrier/stages/1', { name: 'track', damping: 1, naturalFrequencyHz: 20e3 });
  const natural = '/carrier/stages/1/naturalFrequencyHz';

  it.each(cells)('$pointer reads “$typed” and says so', async ({ pointer, typed, value, echo }) => {
    on(StageTable, { loop: 'carrier' });
    const input = wrapper!.get(`[data-pointer="${pointer}"]`);
    await type(input, typed);
    expect(draft.value(pointer)).toBeCloseTo(value, 9);
    expect(wrapper!.get('.got').text()).toContain('understood: ');
    expect(wrapper!.get('.got').text()).toContain(echo);
    expect(wrapper!.get(`#${input.attributes('aria-describedby')}`).text()).toContain(echo);
    await leave(input);
    expect(wrapper!.find('.got').exists()).toBe(false);
  });

  it.each(cells)('$pointer refuses “$wrong”', async ({ pointer, wrong, refusal }) => {
    on(StageTable, { loop: 'carrier' });
    const input = wrapper!.get(`[data-pointer="${pointer}"]`);
    await type(input, wrong);
    await leave(input);
    expect(wrapper!.get('.fault').text()).toContain(refusal);
    expect(input.attributes('aria-invalid')).toBe('true');
  });

  it('takes a natural frequency with its prefix, and no symbol rate for it', async () => {
    on(StageTable, { loop: 'carrier' }, byFrequency);
    const input = wrapper!.get(`[data-pointer="${natural}"]`);
    await type(input, '41.3 kHz');
    expect(draft.value(natural)).toBe(41_300);
    expect(wrapper!.get('.got').text()).toBe('understood: 41.3 kHz');
    await type(input, '41.3 kBd');
    await leave(input);
    expect(wrapper!.get('.fault').text()).toContain('kBd is a symbol rate; this field takes Hz');
  });
});

describe('the phase-noise table', () => {
  const cell = (column: 0 | 1) => wrapper!.get(`[data-pointer="/environment/phaseNoise/1/${column}"]`);
  const point = () => (draft.value('/environment/phaseNoise') as [number, number][])[1];

  it('reads an offset and a level with their units and says so', async () => {
    on(PhaseNoiseTable, {});
    await type(cell(0), '2 kHz');
    expect(wrapper!.get('.got').text()).toBe('understood: 2 kHz');
    await type(cell(1), '−55 dBc/Hz');
    expect(wrapper!.get('.got').text()).toBe('understood: −55 dBc/Hz');
    expect(point()).toEqual([2000, -55]);
  });

  it.each([
    [0, '2 kBd', 'kBd is a symbol rate; this field takes Hz'],
    [1, '−55 dB', 'dB is a level; this field takes dBc/Hz'],
  ] as const)('refuses another unit in column %i: %s', async (column, text, refusal) => {
    on(PhaseNoiseTable, {});
    await type(cell(column), text);
    await leave(cell(column));
    expect(wrapper!.get('.err').text()).toContain(refusal);
    expect(point()).toEqual([1000, -50]);
  });
});

describe('the ring ratios', () => {
  const apsk = withValue(plan(), '/signal/modulation', '16APSK');
  const pointer = '/signal/ringRatios/0';

  it('reads a ratio and refuses a unit that is none', async () => {
    on(RingRatios, {}, apsk);
    const input = wrapper!.get('input');
    await type(input, '257 %');
    expect(draft.value('/signal/ringRatios')).toEqual([2.57]);
    expect(wrapper!.get('.got').text()).toBe('understood: 2.57');
    await type(input, '8 dB');
    await leave(input);
    expect(wrapper!.get('.err').text()).toContain(plain);
  });

  it('opens with the text that could not be read', () => {
    on(RingRatios, {}, apsk, { [pointer]: '8 dB' });
    expect((wrapper!.get('input').element as HTMLInputElement).value).toBe('8 dB');
    expect(draft.misread.value).toHaveProperty([pointer]);
  });
});
