import { mount } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import KsField from '../../../src/components/KsField.vue';

const rate = { number: '1.2', label: 'Symbol rate', unit: 'Bd', modelValue: 27.5e6 } as const;

function field(props: Record<string, unknown>) {
  const wrapper = mount(KsField, {
    props: {
      ...(props as unknown as typeof rate),
      'onUpdate:modelValue': (modelValue: number | undefined) => wrapper.setProps({ modelValue } as never),
    },
    attachTo: document.body,
  });
  const input = wrapper.get('input');
  const type = async (text: string) => {
    await input.trigger('focus');
    await input.setValue(text);
  };
  const values = () => wrapper.emitted<[number | undefined]>('update:modelValue')?.map(([value]) => value) ?? [];
  return { wrapper, input, type, values };
}

describe('KsField', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => {
    vi.useRealTimers();
    document.body.innerHTML = '';
  });

  it('shows the value in the prefix that reads best', () => {
    const { wrapper, input } = field(rate);
    expect(input.element.value).toBe('27.5');
    expect(wrapper.get('.u').text()).toBe('MBd');
    expect(wrapper.get('label').attributes('for')).toBe(input.attributes('id'));
  });

  it('says what it understood while typing and rewrites on leaving', async () => {
    const { wrapper, input, type, values } = field({ ...rate, modelValue: 30e6 });
    await type('27500 k');
    expect(wrapper.get('.got').text()).toBe('understood: 27.5 MBd');
    expect(values()).toEqual([27.5e6]);
    await input.trigger('blur');
    expect(input.element.value).toBe('27.5');
    expect(wrapper.find('.got').exists()).toBe(false);
  });

  it('keeps the unit beside it while a number is typed digit by digit', async () => {
    const { type, values, wrapper } = field(rate);
    await type('2');
    await type('28');
    expect(values()).toEqual([2e6, 28e6]);
    expect(wrapper.get('.u').text()).toBe('MBd');
  });

  it('does not move to another prefix under the typing hand', async () => {
    const { type, values } = field({ ...rate, modelValue: 900e3 });
    await type('1.5 M');
    await type('1500');
    expect(values()).toEqual([1.5e6]);
  });

  it('reads a frequency in a field of ppm that knows its carrier', async () => {
    const { wrapper, type } = field({
      number: '4.2',
      label: 'Tolerance, each end',
      unit: 'ppm',
      modelValue: 25,
      reference: { value: 1.55e9, unit: 'Hz' },
    });
    await type('20 kHz');
    expect(wrapper.get('.got').text()).toBe('understood: 12.903 ppm of 1.55 GHz');
  });

  it('asks instead of guessing and emits nothing meanwhile', async () => {
    const { wrapper, input, type, values } = field(rate);
    await type('1,234');
    await input.trigger('blur');
    expect(wrapper.get('.err').text()).toBe('1,234: 1.234 or 1234? Type one of them.');
    expect(values()).toEqual([]);
    expect(input.element.value).toBe('1,234');
  });

  it('marks a fault only after a rest, and takes it back at once', async () => {
    const { wrapper, input, type } = field({ number: '1.4', label: 'Roll-off α', modelValue: 0.35, min: 0, max: 1 });
    await type('35');
    expect(input.attributes('aria-invalid')).toBeUndefined();
    expect(wrapper.emitted('fault')).toHaveLength(1);
    await vi.advanceTimersByTimeAsync(600);
    expect(wrapper.get('.err').text()).toBe('Roll-off α lies between 0 and 1. Did you mean 0.35?');
    expect(input.attributes('aria-invalid')).toBe('true');
    expect(input.attributes('aria-describedby')).toBe(wrapper.get('.err').attributes('id'));
    await type('0.3');
    expect(wrapper.find('.err').exists()).toBe(false);
  });

  it('refuses an empty field that needs a value and allows it in an optional one', async () => {
    const needed = field(rate);
    await needed.type('');
    await needed.input.trigger('blur');
    expect(needed.wrapper.get('.err').text()).toBe('Symbol rate needs a value.');
    const optional = field({ ...rate, optional: true });
    await optional.type('');
    expect(optional.values()).toEqual([undefined]);
  });

  it('steps the last typed digit, ten at a time with Shift', async () => {
    const { input, values } = field({ number: '2.4', label: 'Extra delay', unit: 'updates', modelValue: 3 });
    await input.trigger('keydown', { key: 'ArrowUp' });
    await input.trigger('keydown', { key: 'ArrowUp', shiftKey: true });
    await input.trigger('keydown', { key: 'ArrowDown' });
    expect(values()).toEqual([4, 14, 13]);
  });

  it('brings the last revision back by Escape twice and by the number', async () => {
    const edited = { number: '2.4', label: 'Extra delay', unit: 'updates', modelValue: 6, was: 3, wasName: 'r14' };
    const keyed = field(edited);
    expect(keyed.wrapper.get('.was').text()).toBe('was 3 updates in r14');
    await keyed.input.trigger('keydown', { key: 'Escape' });
    expect(keyed.values()).toEqual([]);
    await keyed.input.trigger('keydown', { key: 'Escape' });
    expect(keyed.values()).toEqual([3]);
    expect(keyed.input.element.value).toBe('3');
    const clicked = field(edited);
    await clicked.wrapper.get('button.no').trigger('click');
    expect(clicked.values()).toEqual([3]);
    expect(clicked.wrapper.classes()).not.toContain('ed');
  });

  it('shows what the server says when its own text is in order', () => {
    const { wrapper } = field({ ...rate, error: 'The loop clock is 110 MHz.' });
    expect(wrapper.get('.err').text()).toBe('The loop clock is 110 MHz.');
  });

  it('takes Return as leaving, without sending a form', async () => {
    const { input, type } = field(rate);
    await type('28000 k');
    const event = new KeyboardEvent('keydown', { key: 'Enter', cancelable: true });
    input.element.dispatchEvent(event);
    expect(event.defaultPrevented).toBe(true);
    await vi.advanceTimersByTimeAsync(0);
    expect(input.element.value).toBe('28');
  });
});
