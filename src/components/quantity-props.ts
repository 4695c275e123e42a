import type { Reference } from '../../shared/quantities/parse';
import type { Unit } from '../../shared/quantities/units';

/** What a field needs to know about the number it holds. */
export interface QuantityProps {
  /** In the unit; a fraction when the unit is %. Undefined while the field is empty. */
  modelValue?: number | undefined;
  unit?: Unit | undefined;
  /** Lets 20 kHz be typed in a ppm or BnT field, and ppm in a field of Hz. */
  reference?: Reference | undefined;
  /** Both signs are meant: ±. */
  symmetric?: boolean | undefined;
  integer?: boolean | undefined;
  /** Fewest digits behind the point. */
  decimals?: number | undefined;
  /** Writes the prefix behind the number, `10 k`: for tables, whose head names the unit. */
  prefixInside?: boolean | undefined;
  /** Most digits shown; the value keeps all it has. */
  significant?: number | undefined;
  min?: number | undefined;
  max?: number | undefined;
  /** Text that could not be read when the form was last left: the field opens with it instead of its value. */
  typed?: string | undefined;
  /** May stay empty. */
  optional?: boolean | undefined;
  disabled?: boolean | undefined;
  /** What the last revision holds; compared only when `wasName` is set. */
  was?: number | undefined;
  /** Name of the last revision: r14. */
  wasName?: string | undefined;
}

export interface QuantityEmits {
  /** While typing, and only what was understood and lies in range. */
  (event: 'update:modelValue', value: number | undefined): void;
  /** What is wrong with the text now, undefined when nothing is; and the text. */
  (event: 'fault', reason: string | undefined, text: string): void;
}
