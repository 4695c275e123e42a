import { computed } from 'vue';
import { fieldOf } from '../../shared/plan/fields';
import type { Reference } from '../../shared/quantities/parse';
import { lookOf, rangeOf } from '../components/plan/field-looks';
import { useDraft } from './use-draft';

/**
 * One field of the form by its pointer: what it shows, what it was, why it is wrong, and where an edit goes. Fields that
 * the plan holds as log2 show the power of two itself.
 */
export function useField(pointer: () => string) {
  const draft = useDraft();
  const look = computed(() => lookOf(pointer()));
  const shown = (value: unknown): unknown =>
    look.value.power && typeof value === 'number' ? 2 ** value : (value ?? undefined);

  const reference = computed<Reference | undefined>(() => {
    const { ratioOf } = look.value;
    const at = ratioOf === 'carrier' ? '/environment/carrierFrequencyHz' : '/signal/symbolRateBd';
    const value = draft.value(at);
    return ratioOf && typeof value === 'number' ? { value, unit: ratioOf === 'carrier' ? 'Hz' : 'Bd' } : undefined;
  });

  function take(value: unknown) {
    if (!look.value.power || typeof value !== 'number') return draft.set(pointer(), value);
    const exponent = Math.log2(value);
    const whole = Number.isInteger(exponent);
    draft.setText(pointer(), String(value), whole ? undefined : `A full scale is a power of two, as ${near(value)}.`);
    if (whole) draft.set(pointer(), exponent);
  }

  return {
    ...{ draft, look, reference, take },
    no: computed(() => fieldOf(pointer())?.no ?? ''),
    label: computed(() => fieldOf(pointer())?.label ?? ''),
    range: computed(() => rangeOf(pointer())),
    value: computed(() => shown(draft.value(pointer()))),
    was: computed(() => shown(draft.was(pointer()))),
    fault: computed(() => draft.fault(pointer())),
  };
}

/** The powers of two around a value: “2 or 4”. */
const near = (value: number): string => {
  const below = 2 ** Math.floor(Math.log2(value));
  return `${below} or ${2 * below}`;
};
