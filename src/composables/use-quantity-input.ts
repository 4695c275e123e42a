import { computed, onScopeDispose, ref, watch } from 'vue';
import { formatQuantity, quantityText } from '../../shared/quantities/format';
import { stepLastDigit } from '../../shared/quantities/step';
import type { QuantityEmits, QuantityProps } from '../components/quantity-props';
import { afterPress } from './after-press';
import { checkQuantity } from './quantity-check';

/** A field is marked wrong only after this rest, or on leaving; milliseconds. */
const restBeforeFault = 600;

/**
 * The life of a number field: reads while typing, says what it understood, marks a fault late, and writes the value in
 * the field's best unit on leaving.
 *
 * @param props live props of the field
 * @param label how the sentences call the field
 */
export function useQuantityInput(
  props: QuantityProps & { reason?: string | undefined },
  emit: QuantityEmits,
  label: () => string,
) {
  const written = computed(() => writtenOf(props));
  const text = ref(props.typed ?? written.value.number);
  // What the unit beside the field is. It stands still while somebody types: 2 on the way to 27.5 is 2 MBd.
  const shown = ref(written.value);
  const focused = ref(false);
  const rested = ref(true);
  let escapes = 0;
  let rest: ReturnType<typeof setTimeout> | undefined;

  const checked = computed(() => {
    const unit = props.unit ?? '';
    const { reference, symmetric, integer, decimals: least } = props;
    const field = { unit, reference, symmetric, integer, least, shownExponent: shown.value.exponent };
    return checkQuantity(text.value, field, { ...props, unit, label: label() });
  });
  const edited = computed(() => props.wasName !== undefined && props.modelValue !== props.was);
  const fault = computed(() => (rested.value && !props.disabled && !props.reason ? checked.value.fault : undefined));
  const understood = computed(() => {
    const { reading } = checked.value;
    if (!focused.value || reading.kind !== 'value') return undefined;
    const plain = reading.text === [text.value, shown.value.unit].filter(Boolean).join(' ');
    return plain || text.value === shown.value.number ? undefined : `understood: ${reading.text}`;
  });
  /** A typed unit replaces the one beside the field until the field is left. */
  const unitShown = computed(() =>
    /[a-z%°µ]/i.test(text.value) && focused.value ? (props.unit ?? '') : shown.value.unit,
  );

  function rewrite() {
    shown.value = written.value;
    text.value = written.value.number;
    emit('fault', undefined, text.value);
  }

  function type(typed: string) {
    escapes = 0;
    const marked = fault.value !== undefined;
    text.value = typed;
    report();
    rested.value = marked && checked.value.fault !== undefined;
    clearTimeout(rest);
    rest = setTimeout(() => (rested.value = true), restBeforeFault);
  }

  function report() {
    const { reading, fault: wrong } = checked.value;
    emit('fault', wrong, text.value);
    if (wrong !== undefined) return;
    const value = reading.kind === 'value' ? reading.value : undefined;
    if (value !== props.modelValue) emit('update:modelValue', value);
  }

  function leave() {
    focused.value = false;
    rested.value = true;
    if (checked.value.fault === undefined) rewrite();
  }

  /** Once: what was understood last. Twice: what the last revision holds. */
  function escape() {
    escapes += 1;
    rewrite();
    if (escapes >= 2) restore();
  }

  function restore() {
    escapes = 0;
    if (props.wasName !== undefined && props.modelValue !== props.was) emit('update:modelValue', props.was);
  }

  function onKeydown(event: KeyboardEvent) {
    const { key, shiftKey } = event;
    const steps = (key === 'ArrowUp' ? 1 : -1) * (shiftKey ? 10 : 1);
    if (key === 'ArrowUp' || key === 'ArrowDown') type(stepLastDigit(text.value, steps));
    else if (key === 'Enter') leaveOpen();
    else if (key === 'Escape') escape();
    else return;
    event.preventDefault();
  }

  /** Return reads the text as leaving does, and never sends a form. */
  function leaveOpen() {
    rested.value = true;
    if (checked.value.fault === undefined) rewrite();
  }

  watch(written, (now) => {
    const own = checked.value.reading;
    const typed = focused.value && own.kind === 'value' && own.value === props.modelValue;
    if (!typed || now.number === '') rewrite();
  });
  onScopeDispose(() => clearTimeout(rest));

  if (props.typed !== undefined) report();

  const on = {
    input: (event: Event) => type((event.target as HTMLInputElement).value),
    focus: () => (focused.value = true),
    blur: () => afterPress(leave),
    keydown: onKeydown,
  };
  const wasText = computed(() => (edited.value ? wasSentence(props) : undefined));
  return { text, fault, understood, unitShown, edited, wasText, restore, on };
}

function writtenOf({ modelValue, unit = '', symmetric, decimals, significant, prefixInside }: QuantityProps) {
  if (modelValue === undefined) return { number: '', unit: unit as string, exponent: undefined };
  const parts = formatQuantity(modelValue, { unit, symmetric, significant, least: decimals, groupFrom: 5 });
  if (!prefixInside || parts.unit === unit) return parts;
  // In a table the head names the unit once: each cell carries its own prefix, and a bare number is in the unit itself.
  return { number: `${parts.number} ${parts.unit.slice(0, -unit.length)}`, unit, exponent: 0 };
}

function wasSentence({ was, wasName, unit = '', symmetric, decimals, significant }: QuantityProps): string {
  const before = was === undefined ? 'empty' : quantityText(was, { unit, symmetric, significant, least: decimals });
  return `was ${before} in ${wasName}`;
}
