import { mount, type DOMWrapper } from '@vue/test-utils';
import { afterEach, describe, expect, it } from 'vitest';
import { defineComponent, h, nextTick, ref } from 'vue';
import { examplePlan } from '../../../../src/components/plans/example-plan';
import CheckFields from '../../../../src/components/replays/CheckFields.vue';
import { suggestedForm, type CheckForm } from '../../../../src/components/replays/check-form';

type Input = Pick<DOMWrapper<Element>, 'trigger' | 'setValue'>;

const description = examplePlan('corvid-c2');
afterEach(() => void (document.body.innerHTML = ''));

function opened() {
  const form = ref<CheckForm>(suggestedForm(description));
  const props = {
    revision: { description },
    error: null,
    'onUpdate:modelValue': (now: CheckForm) => (form.value = now),
  };
  const host = defineComponent(() => () => h(CheckFields as never, { ...props, modelValue: form.value }));
  const wrapper = mount(host, { attachTo: document.body });
  return { form, wrapper, field: (number: string) => wrapper.get(`[id="field-${number}"]`) };
}
async function leave(input: Input) {
  await input.trigger('blur');
  await input.trigger('focusout');
  await new Promise((done) => setTimeout(done));
  await nextTick();
}

describe('the fields of a tolerance check', () => {
  // 50 ppm of 1.55 GHz are 77.5 kHz.
  it.each([
    ['2.1', '−80 kHz', 'startHz', -80e3, 'understood: −80 kHz'],
    ['2.2', '50 ppm', 'stopHz', 77_500, 'understood: 77.5 kHz of 1.55 GHz'],
    ['3.2', '30 k', 'symbols', 30_000, 'understood: 30\u202f000 symbols'],
    ['4.1', '98 %', 'lockProbability', 0.98, 'understood: 0.98'],
    ['4.2', '99 %', 'confidence', 0.99, 'understood: 99 %'],
  ] as const)('%s reads “%s”', async (number, text, key, value, echo) => {
    const { form, wrapper, field } = opened();
    await field(number).trigger('focus');
    await field(number).setValue(text);
    expect(form.value[key]).toBeCloseTo(value, 6);
    expect(wrapper.findAll('.got').map((line) => line.text())).toContain(echo);
  });

  it.each([
    ['2.1', '−80 kBd', 'kBd is a symbol rate; this field takes Hz'],
    ['3.2', '30 bits', 'bits is a number of bits; this field takes symbols'],
    ['4.1', '98 dB', 'dB is a level; this field takes a plain number'],
  ])('%s refuses “%s”', async (number, text, refusal) => {
    const { wrapper, field } = opened();
    await field(number).setValue(text);
    await leave(field(number));
    expect(wrapper.get('.err').text()).toContain(refusal);
  });

  it('asks at its field what a comma in the list of Es/N0 is', async () => {
    const { wrapper, field } = opened();
    await field('3.1').setValue('6,5');
    await leave(field('3.1'));
    expect(wrapper.get('.err').text()).toBe('6,5: 6.5, or 6 and 5? Type 6.5 or 6, 5.');
  });
});
