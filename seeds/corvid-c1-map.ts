import type { RegisterMap } from '../shared/model/register-map';
import type { TargetBody } from '../shared/model/target';
import { bound, gainRegister, handOver, shiftRegister } from './corvid-map-parts';

const registerMap: RegisterMap = {
  wordBits: 32,
  byteOrder: 'little',
  registers: [
    { name: 'CAR_FCW', offset: 0x104, fields: [bound('fcw', [31, 0], 'carrier.nco.fcw')] },
    gainRegister('CAR_GAIN_ACQ', 0x108, 'carrier', 'acquire'),
    shiftRegister('CAR_SHIFT_ACQ', 0x10c, 'carrier', 'acquire'),
    gainRegister('CAR_GAIN_TRK', 0x110, 'carrier', 'track'),
    shiftRegister('CAR_SHIFT_TRK', 0x114, 'carrier', 'track'),
    handOver('CAR_ACQ_END', 0x118, 'carrier'),
    {
      name: 'LOCK_DET',
      offset: 0x11c,
      fields: [
        bound('average', [26, 16], 'carrier.lock.averagingSymbols'),
        bound('threshold', [8, 0], 'carrier.lock.threshold', { reset: 0x80 }),
      ],
    },
    // Last, so that the loop starts with its gains in place.
    {
      name: 'CAR_CTRL',
      offset: 0x100,
      fields: [bound('rounding', [5, 4], 'carrier.rounding'), { name: 'enable', high: 0, low: 0, constant: 1 }],
    },
  ],
};

/** The board before it: carrier recovery only, without an integrator limit. */
export const corvidC1Target: TargetBody = {
  slug: 'corvid-c1',
  name: 'Corvid C1',
  loopClockHz: 55e6,
  cPrefix: 'CVA_',
  baseAddress: '0x40000000',
  registerMap,
};
