/**
 * Offset and word of every write of the fixture, worked out by hand. Signed fields in two's complement:
 * −547 = 0xFDDD and −2047 = 0xF801 in 16 bits; −6 = 0x7A, −3 = 0x7D and −1 = 0x7F in 7 bits.
 */
export const written: readonly (readonly [name: string, offset: number, word: number])[] = [
  // delay 3 at bit 24, sign detector (1) at bit 8, convergent (2) at bit 4, two constants
  ['CAR_CTRL', 0x4000, 0x03000123],
  ['CAR_FCW', 0x4004, 0xffffffff],
  ['CAR_GAIN_ACQ', 0x4008, 0xfddd0321], // −547, 801 = 0x321
  ['CAR_SHIFT_ACQ', 0x400c, 0x00007a7d], // −6, −3
  ['CAR_GAIN_TRK', 0x4010, 0xf80103ff], // −2047, 1023
  ['CAR_SHIFT_TRK', 0x4014, 0x00001f0c], // 31, 12
  // 250e3·2^40/27.5e6 = 9995560252.5…, rounded down: 2·2^32 + 1405625660, and 1405625660 = 0x53C8253C
  ['CAR_LIMIT', 0x4018, 0x53c8253c],
  ['CAR_LIMIT_HI', 0x401c, 0x00000002],
  ['CAR_ACQ_END', 0x4020, 0x80000fa0], // by lock, 4000 symbols
  // hold at bit 16, Gardner (0), cubic (2) at bit 6, convergent (2) at bit 4, enable
  ['CLK_CTRL', 0x4040, 0x000100a1],
  ['CLK_STEP', 0x4044, 0x80000000], // 2^32/2
  ['CLK_GAIN_ACQ', 0x4048, 0x04b005dc], // 1200, 1500
  ['CLK_SHIFT_ACQ', 0x404c, 0x00007f04], // −1, 4
  ['CLK_GAIN_TRK', 0x4050, 0x07cf0457], // 1999, 1111
  ['CLK_SHIFT_TRK', 0x4054, 0x00000205], // 2, 5
  // no limit: 2^39 − 1, the largest value of a 40-bit integrator
  ['CLK_LIMIT', 0x4058, 0xffffffff],
  ['CLK_LIMIT_HI', 0x405c, 0x0000007f],
  ['LOCK_DET', 0x4070, 0x01000099], // 256 at bit 16, ⌊256·0.6⌋ = 153
];
