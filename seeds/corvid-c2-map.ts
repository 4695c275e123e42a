import type { RegisterMap } from '../shared/model/register-map';
import type { TargetBody } from '../shared/model/target';
import { bound, gainRegister, handOver, limitRegisters, shiftRegister } from './corvid-map-parts';

const registerMap: RegisterMap = {
  wordBits: 32,
  byteOrder: 'little',
  registers: [
    {
      name: 'CAR_CTRL',
      offset: 0x4000,
      fields: [
        bound('delay', [30, 24], 'carrier.delay'),
        bound('polarity', [12, 12], 'carrier.polarity'),
        bound('detector', [10, 8], 'carrier.detector', { reset: 1 }),
        bound('rounding', [5, 4], 'carrier.rounding'),
        { name: 'nco_enable', high: 1, low: 1, constant: 1, reset: 1 },
        { name: 'enable', high: 0, low: 0, constant: 1, reset: 1 },
      ],
    },
    { name: 'CAR_FCW', offset: 0x4004, fields: [bound('fcw', [31, 0], 'carrier.nco.fcw')] },
    gainRegister('CAR_GAIN_ACQ', 0x4008, 'carrier', 'acquire'),
    shiftRegister('CAR_SHIFT_ACQ', 0x400c, 'carrier', 'acquire'),
    gainRegister('CAR_GAIN_TRK', 0x4010, 'carrier', 'track'),
    shiftRegister('CAR_SHIFT_TRK', 0x4014, 'carrier', 'track'),
    ...limitRegisters('CAR_LIMIT', 0x4018, 'carrier'),
    handOver('CAR_ACQ_END', 0x4020, 'carrier'),
    {
      name: 'CLK_CTRL',
      offset: 0x4040,
      fields: [
        bound('hold', [16, 16], 'clock.hold'),
        bound('detector', [10, 8], 'clock.detector'),
        bound('interpolator', [7, 6], 'clock.interpolator', { reset: 2 }),
        bound('rounding', [5, 4], 'clock.rounding'),
        { name: 'enable', high: 0, low: 0, constant: 1, reset: 1 },
      ],
    },
    { name: 'CLK_STEP', offset: 0x4044, fields: [bound('step', [31, 0], 'clock.counter.nominalStep')] },
    gainRegister('CLK_GAIN_ACQ', 0x4048, 'clock', 'acquire'),
    shiftRegister('CLK_SHIFT_ACQ', 0x404c, 'clock', 'acquire'),
    gainRegister('CLK_GAIN_TRK', 0x4050, 'clock', 'track'),
    shiftRegister('CLK_SHIFT_TRK', 0x4054, 'clock', 'track'),
    ...limitRegisters('CLK_LIMIT', 0x4058, 'clock'),
    {
      name: 'LOCK_DET',
      offset: 0x4070,
      fields: [
        bound('average', [26, 16], 'carrier.lock.averagingSymbols'),
        bound('threshold', [8, 0], 'carrier.lock.threshold', { reset: 0x99 }),
      ],
    },
  ],
};

/** Receiver board of the demo: carrier and clock recovery, two stages each. */
export const corvidC2Target: TargetBody = {
  slug: 'corvid-c2',
  name: 'Corvid C2',
  loopClockHz: 110e6,
  cPrefix: 'CVD_',
  baseAddress: '0x40010000',
  registerMap,
};
