import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { workOut } from '../../shared/design';
import { ParameterError } from '../../shared/parameter-error';
import { filled } from './sample-plan';

/** A number between two others, spread evenly over its logarithm. */
const spread = (low: number, high: number) =>
  fc
    .double({ min: Math.log(low), max: Math.log(high), noNaN: true })
    .map((x) => Math.min(Math.max(Math.exp(x), low), high));
const between = (min: number, max: number) => fc.integer({ min, max });
const some = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: undefined });
/** The first nine times out of ten, so that most plans can be worked out although every value is tried. */
const mostly = <T>(usual: fc.Arbitrary<T>, rest: fc.Arbitrary<T>) =>
  fc.oneof({ weight: 9, arbitrary: usual }, { weight: 1, arbitrary: rest });
const without = (value: object): object => JSON.parse(JSON.stringify(value)) as object;

const stage = fc.record({
  damping: some(fc.double({ min: 0.05, max: 10, noNaN: true })),
  noiseBandwidth: mostly(spread(1e-6, 0.03), spread(1e-12, 0.5)),
  naturalFrequencyHz: mostly(fc.constant<number | undefined>(undefined), spread(1e-3, 1e12)),
  until: some(fc.record({ symbols: between(1, 1e6) })),
});
const stages = fc.array(stage, { minLength: 1, maxLength: 3 }).map((list) =>
  list.map(({ noiseBandwidth, ...rest }, i) => ({
    name: `stage${i}`,
    ...rest,
    ...(rest.naturalFrequencyHz === undefined ? { noiseBandwidth } : {}),
  })),
);

const arithmetic = (limit: string) =>
  fc
    .record({
      errorBits: between(2, 32),
      errorFullScaleLog2: between(-32, 32),
      gainForm: fc.constantFrom('multiplier', 'shift', 'shift-add'),
      mantissaBits: between(2, 32),
      integratorBits: between(8, 64),
      guardBits: mostly(between(0, 7), between(0, 63)),
      rounding: fc.constantFrom('floor', 'nearest', 'convergent'),
      overflow: fc.constantFrom('saturate', 'wrap', { error: 'wrap' }),
      limit: some(spread(1, 1e6)),
    })
    .map(({ limit: value, ...rest }) => ({ ...rest, ...(value === undefined ? {} : { [limit]: value }) }));

/** Damping belongs to order 2; one loop in ten keeps it elsewhere. */
const withoutDamping = <T extends { order: number; stages: object[] }>(made: fc.Arbitrary<T>) =>
  fc.tuple(made, between(0, 9)).map(([parts, keep]) => {
    if (parts.order === 2 || keep === 0) return parts;
    return { ...parts, stages: parts.stages.map((each) => ({ ...each, damping: undefined })) };
  });

const loop = {
  order: mostly(fc.constant(2), fc.constantFrom(1, 3)),
  updateInterval: mostly(fc.constantFrom(1, 1, 2, 8), fc.constantFrom(1024, 0.5, 1 / 3, 1.5)),
  delay: fc.oneof(between(0, 8), between(0, 64)),
  method: fc.constantFrom('nominal', 'exact'),
  prewarp: fc.boolean(),
  polarity: fc.constantFrom(1, -1),
  stages,
};

const signal = fc.record({
  modulation: mostly(fc.constantFrom('QPSK', 'BPSK'), fc.constantFrom('8PSK', 'OQPSK', '16QAM')),
  symbolRateBd: spread(1e-3, 1e12),
  samplesPerSymbol: mostly(fc.constantFrom(2, 2.5, 64), fc.constant(1)),
  rollOff: mostly(fc.constantFrom(1e-9, 0.35, 1), fc.constant(0)),
  esN0Db: fc.double({ min: -10, max: 60, noNaN: true }),
  amplitude: spread(1e-6, 1e6),
  sampleBits: between(4, 24),
  sampleFullScaleLog2: between(-32, 32),
});
const carrier = withoutDamping(
  fc.record({
    ...loop,
    detector: mostly(fc.constant('sign'), fc.constantFrom('costas', 'decision')),
    nco: fc.record({
      widthBits: between(8, 64),
      phaseBits: between(3, 8),
      stepsPerSymbol: fc.constantFrom(1, 6),
      centreHz: fc.constantFrom(0, -1e12),
    }),
    arithmetic: arithmetic('integratorLimitHz'),
  }),
);
const clock = withoutDamping(
  fc.record({
    ...loop,
    interpolator: fc.constantFrom('cubic', 'linear'),
    hold: fc.boolean(),
    counter: fc.record({ widthBits: between(8, 48), fractionBits: between(1, 10) }),
    arithmetic: arithmetic('integratorLimitPpm'),
  }),
);
const environment = fc.record({
  carrierFrequencyHz: some(spread(1, 1e15)),
  carrierTolerancePpm: fc.constantFrom(0, 20, 1e6),
  dopplerHz: fc.constantFrom(0, 5, 1e12),
  clockTolerancePpm: fc.constantFrom(0, 20, 1e6),
  phaseNoise: some(
    fc.constantFrom(
      [
        [1, -20],
        [1e3, -80],
      ],
      [
        [1e-12, 50],
        [1e12, 50],
      ],
    ),
  ),
});

const plan = fc
  .record({ signal, carrier: some(carrier), clock: some(clock), environment })
  .filter((parts) => parts.carrier !== undefined || parts.clock !== undefined)
  .map((parts) => without({ name: 'Any', target: 'any', ...parts }));

/** The first number in a design that is not finite. */
function notFinite(value: unknown, path = ''): string | undefined {
  if (typeof value === 'number') return Number.isFinite(value) ? undefined : path;
  if (typeof value !== 'object' || value === null) return undefined;
  for (const [key, inner] of Object.entries(value)) {
    const found = notFinite(inner, `${path}/${key}`);
    if (found) return found;
  }
  return undefined;
}

describe('workOut of any plan that the schema accepts', () => {
  it('gives finite numbers or points at what it cannot do', () => {
    let workedOut = 0;
    const check = (parts: object): void => {
      try {
        expect(notFinite(workOut(filled(structuredClone(parts))))).toBeUndefined();
        workedOut += 1;
      } catch (error) {
        if (!(error instanceof ParameterError)) throw error;
        expect(error.parameter).toMatch(/^\/(signal|carrier|clock|environment)\//);
      }
    };
    fc.assert(fc.property(plan, check), { numRuns: 150, seed: 20261201 });
    expect(workedOut).toBeGreaterThan(20);
  }, 30_000);
});
