import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { carrierInDoubles } from '../../../../shared/fixed-point/datapath/carrier-doubles';
import { carrierNodes, type CarrierRunner } from '../../../../shared/fixed-point/datapath/carrier-nodes';
import { carrierInIntegers } from '../../../../shared/fixed-point/datapath/carrier-runner';
import { fitsDoubles } from '../../../../shared/fixed-point/datapath/fits-doubles';
import { carrierTables } from '../../../../shared/fixed-point/tables';
import type { CarrierWords } from '../../../../shared/model/words';
import { carrierCases } from './cases';

// Unbounded integers take their time on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

const symbols = 200;

function run(runner: CarrierRunner, xI: Int32Array, xQ: Int32Array) {
  const nodes = carrierNodes(symbols);
  const known = Uint8Array.from(xI, (value) => value & 1);
  // Two runs: the state has to survive between them.
  const first = carrierNodes(symbols);
  runner.run(xI, xQ, known, 100, first);
  runner.run(xI.subarray(100), xQ.subarray(100), known.subarray(100), symbols - 100, nodes);
  return { first, nodes };
}

const mode = fc.constantFrom('saturate', 'wrap');
const gain = fc.record({
  mantissa: fc.oneof(fc.integer({ min: -2048, max: 2047 }), fc.integer({ min: -(2 ** 20), max: 2 ** 20 })),
  shift: fc.oneof(fc.integer({ min: -12, max: 20 }), fc.integer({ min: -63, max: 63 })),
});
const stage = fc.record({
  proportional: gain,
  integral: gain,
  integral2: gain,
  untilSymbols: fc.option(fc.integer({ min: 1, max: 150 })),
  lockThreshold: fc.option(fc.integer({ min: 0, max: 256 })),
});
const detector = fc.constantFrom(
  { detector: 'costas', modulation: 'bpsk' },
  { detector: 'sign', modulation: 'bpsk' },
  { detector: 'sign', modulation: 'qpsk' },
  { detector: 'decision', modulation: '16qam', amplitude: 0.6 },
  { detector: 'known-symbols', modulation: 'qpsk', amplitude: 0.6 },
  { detector: 'power-law', power: 4, powerSign: -1 },
  { detector: 'power-law', power: 8, powerSign: 1 },
);
const configuration = fc
  .record({
    detector,
    order: fc.constantFrom(1, 2, 3),
    rounding: fc.constantFrom('floor', 'nearest', 'convergent'),
    overflow: fc.record({
      sample: mode,
      error: mode,
      proportional: mode,
      increment: mode,
      integrator: mode,
      increment2: mode,
      integrator2: mode,
    }),
    sampleBits: fc.integer({ min: 4, max: 16 }),
    sampleFullScaleLog2: fc.integer({ min: -1, max: 1 }),
    tableBits: fc.integer({ min: 4, max: 16 }),
    errorBits: fc.integer({ min: 2, max: 20 }),
    errorFullScaleLog2: fc.integer({ min: -2, max: 2 }),
    rate: fc.constantFrom([1, 1, 1], [1, 1, 2], [3, 1, 1], [1, 2, 4]),
    delay: fc.integer({ min: 0, max: 5 }),
    integratorBits: fc.integer({ min: 16, max: 52 }),
    guardBits: fc.integer({ min: 0, max: 15 }),
    integrator2Bits: fc.integer({ min: 16, max: 52 }),
    guard2Bits: fc.integer({ min: 0, max: 15 }),
    integratorLimit: fc.option(fc.integer({ min: 1, max: 2 ** 15 - 1 })),
    lock: fc.constantFrom({ averagingSymbols: 8, power: 2, sign: 1 }, { averagingSymbols: 64, power: 4, sign: -1 }),
    stages: fc.array(stage, { minLength: 1, maxLength: 3 }),
    widthBits: fc.integer({ min: 12, max: 48 }),
    phaseBits: fc.integer({ min: 3, max: 12 }),
    fcw: fc.nat(4095),
  })
  .map(
    ({
      detector: chosen,
      rate: [symbolsPerUpdate, updatesPerSymbol, stepsPerSymbol],
      widthBits,
      phaseBits,
      fcw,
      ...rest
    }) => {
      const nco = { widthBits, phaseBits, stepsPerSymbol, fcw };
      return {
        loop: 'carrier',
        ...chosen,
        ...rest,
        symbolsPerUpdate,
        updatesPerSymbol,
        nco,
      } as unknown as CarrierWords;
    },
  );

const samples = (bits: number, seed: number): Int32Array => {
  let state = seed | 1;
  return Int32Array.from({ length: symbols }, () => (state = Math.imul(state, 1664525) + 1013904223) >> (32 - bits));
};

describe('carrierInDoubles', () => {
  it('gives the nodes of the exact datapath wherever the widths prove that it can', () => {
    let proved = 0;
    fc.assert(
      fc.property(configuration, fc.integer(), (words, seed) => {
        const tables = carrierTables(words);
        if (!fitsDoubles(words, tables).fits) return;
        proved += 1;
        const [xI, xQ] = [samples(words.sampleBits, seed), samples(words.sampleBits, seed ^ 0x5bd1e995)];
        expect(run(carrierInDoubles(words, tables), xI, xQ)).toEqual(run(carrierInIntegers(words, tables), xI, xQ));
      }),
      { numRuns: 120, seed: 7 },
    );
    expect(proved).toBeGreaterThan(60);
  });

  it.each(carrierCases.filter(({ words }) => fitsDoubles(words, carrierTables(words)).fits))(
    'reproduces reference case $name',
    ({ words, steps }) => {
      const runner = carrierInDoubles(words, carrierTables(words));
      const nodes = carrierNodes(steps.length);
      const rail = (k: 0 | 1) => Int32Array.from(steps, ({ x }) => x[k]);
      runner.run(rail(0), rail(1), new Uint8Array(steps.length), steps.length, nodes);
      expect([...nodes.zI]).toEqual(steps.map(({ z }) => z[0]));
      expect([...nodes.zQ]).toEqual(steps.map(({ z }) => z[1]));
      expect([...nodes.stage]).toEqual(steps.map(({ stage: index }) => index));
      expect([...nodes.phaseLow]).toEqual(steps.map(({ phase }) => Number(BigInt.asIntN(32, BigInt(phase)))));
    },
  );
});

describe('fitsDoubles', () => {
  const plain = carrierCases.find(({ words }) => words.detector === 'sign' && words.nco.widthBits === 32)!.words;

  it('proves a 32-bit NCO with a 48-bit integrator', () => {
    expect(fitsDoubles(plain, carrierTables(plain))).toEqual({ fits: true });
  });

  it.each([
    ['integrator', { integratorBits: 54, order: 2 }],
    ['phase', { nco: { ...plain.nco, widthBits: 48, stepsPerSymbol: 64 } }],
    ['detector value', { sampleBits: 24, symbolsPerUpdate: 1024, detector: 'costas', errorFullScaleLog2: 32 }],
    [
      'proportional product',
      { errorBits: 32, stages: [{ ...plain.stages[0]!, proportional: { mantissa: 2 ** 23, shift: 0 } }] },
    ],
  ])('refuses a value on the way to the %s', (reason, change) => {
    const words = { ...plain, ...change } as CarrierWords;
    expect(fitsDoubles(words, carrierTables(words))).toEqual({ fits: false, reason });
  });
});
