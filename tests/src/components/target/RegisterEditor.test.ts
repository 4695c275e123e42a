import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import { corvidC2Target } from '../../../../seeds/corvid-c2-map';
import { registerValues } from '../../../../shared/registers/binding';
import { mapFindings } from '../../../../shared/registers/map';
import { quantitiesOf } from '../../../../shared/registers/quantities';
import RegisterEditor from '../../../../src/components/target/RegisterEditor.vue';
import { quantityChoices } from '../../../../src/components/target/quantity-choices';
import { design, plan } from '../../../shared/files/fixture';

const map = corvidC2Target.registerMap;
const values = registerValues(map, quantitiesOf({ plan, design }));
const index = map.registers.findIndex(({ name }) => name === 'CAR_GAIN_ACQ');

const editor = (more: object = {}) =>
  mount(RegisterEditor, {
    props: {
      ...{ map, index, findings: mapFindings(map), choices: quantityChoices(['acquire', 'track']) },
      ...{ value: values[index], valuesOf: 'r14', editable: true, misread: [] },
      ...more,
    },
  });

describe('RegisterEditor', () => {
  // The words of the fixture: −547 and 801, together 0xFDDD0321.
  it('shows what the revision writes beside each field, and the word', () => {
    const text = editor().text();
    expect(text).toContain('In r14');
    expect(text).toContain('−547');
    expect(text).toContain('801');
    expect(text).toContain('0xFDDD0321');
  });

  it('says each edit once it is a number, and what is none', async () => {
    const wrapper = editor();
    const low = wrapper.get('[aria-label="Low bit of mantissa_i"]');
    await low.setValue('0x11');
    expect(wrapper.emitted('field')).toEqual([[0, { low: 17 }]]);
    await low.setValue('wide');
    expect(wrapper.emitted('field')).toHaveLength(1);
    expect(wrapper.emitted('fault')).toMatchObject([
      [{ sentence: 'Low bit of mantissa_i is no whole number: “wide”.' }],
    ]);
  });

  it('binds a field with the coding of the quantity', async () => {
    const wrapper = editor();
    await wrapper.get('[aria-label="Quantity of mantissa_p"]').setValue('carrier.nco.fcw');
    expect(wrapper.emitted('field')?.[0]).toMatchObject([1, { quantity: 'carrier.nco.fcw', coding: 'unsigned' }]);
  });

  it('is text where nothing may be changed', () => {
    const wrapper = editor({ editable: false });
    expect(wrapper.findAll('input, select, button')).toHaveLength(0);
    expect(wrapper.text()).toContain('carrier.acquire.integral.mantissa');
  });
});
