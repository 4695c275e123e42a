import { mount } from '@vue/test-utils';
import { beforeEach, describe, expect, it } from 'vitest';
import KsButton from '../../../src/components/KsButton.vue';
import KsFold from '../../../src/components/KsFold.vue';
import KsGauge from '../../../src/components/KsGauge.vue';
import KsSegments from '../../../src/components/KsSegments.vue';
import KsState from '../../../src/components/KsState.vue';
import { shapes, words, type State } from '../../../src/components/states';

beforeEach(() => localStorage.clear());

describe('KsState', () => {
  it('gives every state a shape of its own beside its word', () => {
    const drawn = Object.values(shapes).map((shape) => JSON.stringify(shape));
    expect(new Set(drawn).size).toBe(Object.keys(words).length);
  });

  it.each<[{ state: State; count?: number; label?: string; bare?: boolean }, string]>([
    [{ state: 'caution', count: 2 }, '2 caution'],
    [{ state: 'none' }, 'not run'],
    [{ state: 'fail', label: 'shut' }, 'shut'],
    [{ state: 'pass', bare: true }, ''],
  ])('says %o', (props, text) => {
    expect(mount(KsState, { props }).text()).toBe(text);
  });
});

describe('KsButton', () => {
  it('says beside itself why it is shut', () => {
    const wrapper = mount(KsButton, { props: { reason: 'Waits for 2 gates.' }, slots: { default: 'Freeze 2.4.0' } });
    const button = wrapper.get('button');
    expect(button.attributes('disabled')).toBeDefined();
    expect(wrapper.get(`[id="${button.attributes('aria-describedby')}"]`).text()).toBe('Waits for 2 gates.');
  });

  it('hands other attributes to the button itself', () => {
    const wrapper = mount(KsButton, { attrs: { 'data-safe': '', 'aria-expanded': 'true' } });
    expect(wrapper.get('button').attributes()).toMatchObject({ 'data-safe': '', 'aria-expanded': 'true' });
  });

  it('does nothing a second time while it is busy', async () => {
    const wrapper = mount(KsButton, { props: { busy: true } });
    await wrapper.get('button').trigger('click');
    expect(wrapper.emitted('click')).toBeUndefined();
  });

  it('is no toggle unless told so', () => {
    const pressed = (props = {}) => mount(KsButton, { props }).get('button').attributes('aria-pressed');
    expect(pressed()).toBeUndefined();
    expect(pressed({ pressed: false })).toBe('false');
  });
});

describe('KsFold', () => {
  const fold = () => mount(KsFold, { props: { number: 2, title: 'Carrier loop', remember: 'plan', bad: true } });

  it('remembers that it was shut and says what is wrong inside', async () => {
    const first = fold();
    expect(first.get('.sum').text()).toBe('a field is wrong');
    const details = first.get('details');
    (details.element as HTMLDetailsElement).open = false;
    await details.trigger('toggle');
    expect((fold().get('details').element as HTMLDetailsElement).open).toBe(false);
  });
});

describe('KsSegments', () => {
  it('keeps the type of its values and brings the last revision back', async () => {
    const options = [1, 2, 3].map((value) => ({ value, label: String(value) }));
    const wrapper = mount(KsSegments<number>, {
      props: { number: '2.2', label: 'Order', options, modelValue: 3, was: 2, wasName: 'r14' },
    });
    expect(wrapper.get('[role=radiogroup]').attributes('aria-label')).toBe('Order');
    await wrapper.findAll('input')[0]!.setValue(true);
    await wrapper.get('button.no').trigger('click');
    expect(wrapper.emitted('update:modelValue')).toEqual([[1], [2]]);
  });
});

describe('KsGauge', () => {
  const hatched = (value: number, bound: 'max' | 'min') =>
    mount(KsGauge, { props: { value, limit: 3, bound, unit: '° rms', state: 'fail', decimals: 2 } });

  it('hatches the missing or the excess part only', () => {
    expect(hatched(2, 'max').findAll('rect')).toHaveLength(1);
    expect(hatched(4, 'max').findAll('rect')).toHaveLength(2);
    expect(hatched(2, 'min').findAll('rect')).toHaveLength(2);
  });

  it('draws value and limit in proportion', () => {
    const [solid, excess] = hatched(4, 'max').findAll('rect');
    const width = (rect: typeof solid) => Number(rect!.attributes('width'));
    expect(width(solid) / width(excess)).toBeCloseTo(3, 9);
  });

  it('shows what is missing below zero', () => {
    const props = { value: -0.2, limit: 0, bound: 'min', unit: 'bits', state: 'caution', decimals: 1 } as const;
    const [solid, missing] = mount(KsGauge, { props }).findAll('rect');
    expect(Number(solid!.attributes('width'))).toBe(0);
    expect(Number(missing!.attributes('width'))).toBeGreaterThan(20);
    expect(Number(missing!.attributes('x'))).toBeGreaterThan(0);
  });

  it('repeats it in words', () => {
    expect(hatched(4, 'max').text().replace(/\s+/g, ' ')).toBe('4.00° rms, max 3.00');
  });
});
