import type { Field, Register } from '../shared/model/register-map';

type Loop = 'carrier' | 'clock';
type Stage = 'acquire' | 'track';

/** A field bound to a quantity; signed where the quantity can be negative. */
export const bound = (
  name: string,
  [high, low]: [number, number],
  quantity: string,
  more: Partial<Field> = {},
): Field => ({
  name,
  high,
  low,
  quantity,
  ...more,
});

/** Both mantissas of a stage, 16 bits each. */
export const gainRegister = (name: string, offset: number, loop: Loop, stage: Stage): Register => ({
  name,
  offset,
  note: 'Taken over at the next update.',
  fields: [
    bound('mantissa_i', [31, 16], `${loop}.${stage}.integral.mantissa`, { coding: 'signed' }),
    bound('mantissa_p', [15, 0], `${loop}.${stage}.proportional.mantissa`, { coding: 'signed' }),
  ],
});

/** Both right shifts of a stage, −63 to 63. */
export const shiftRegister = (name: string, offset: number, loop: Loop, stage: Stage): Register => ({
  name,
  offset,
  fields: [
    bound('shift_i', [14, 8], `${loop}.${stage}.integral.shift`, { coding: 'signed' }),
    bound('shift_p', [6, 0], `${loop}.${stage}.proportional.shift`, { coding: 'signed' }),
  ],
});

/** An integrator limit of up to 63 bits over two registers. */
export const limitRegisters = (name: string, offset: number, loop: Loop): Register[] => [
  { name, offset, fields: [bound('limit', [31, 0], `${loop}.integratorLimit`)] },
  {
    name: `${name}_HI`,
    offset: offset + 4,
    fields: [bound('limit', [31, 0], `${loop}.integratorLimit`, { quantityLow: 32 })],
  },
];

/** When the first stage hands over: by count, by lock, or by whichever comes first. */
export const handOver = (name: string, offset: number, loop: Loop): Register => ({
  name,
  offset,
  note: 'First stage to second; a count of 0 never ends the stage.',
  fields: [
    bound('by_lock', [31, 31], `${loop}.acquire.untilLock`),
    bound('symbols', [30, 0], `${loop}.acquire.untilSymbols`),
  ],
});
