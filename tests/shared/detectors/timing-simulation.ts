import { constellation } from '../../../shared/fixed-point/constellation';

/** Samples to a symbol: offsets are whole eighths. */
const rate = 8;
/** Symbols that the root pulse reaches to either side. */
const reach = 16;

/** Root-raised-cosine pulse of unit energy, t in symbols (CCITT-style textbook form). */
function rootPulse(t: number, a: number): number {
  if (t === 0) return 1 - a + (4 * a) / Math.PI;
  if (Math.abs(Math.abs(t) - 1 / (4 * a)) < 1e-9) {
    const angle = Math.PI / (4 * a);
    return (a / Math.SQRT2) * ((1 + 2 / Math.PI) * Math.sin(angle) + (1 - 2 / Math.PI) * Math.cos(angle));
  }
  const top = Math.sin(Math.PI * t * (1 - a)) + 4 * a * t * Math.cos(Math.PI * t * (1 + a));
  return top / (Math.PI * t * (1 - (4 * a * t) ** 2));
}

/** M. Matsumoto's and T. Nishimura's successor for small tests: mulberry32, and Box–Muller on it. */
function random(seed: number): { uniform: () => number; normal: () => number } {
  let state = seed;
  const uniform = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
  const normal = (): number => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  return { uniform, normal };
}

export interface Received {
  symbols: number;
  /** Rails at a whole number of eighths of a symbol, lock at multiples of 8. */
  rails: [Float64Array, Float64Array];
}

/** Random symbols through transmit pulse, white noise and matched filter, all of it sampled eight times a symbol. */
export function received({
  modulation,
  rollOff,
  esN0,
  symbols,
  seed,
  stride = 2,
}: {
  modulation: string;
  rollOff: number;
  /** As a ratio; Infinity for none. */
  esN0: number;
  symbols: number;
  seed: number;
  /** Eighths of a symbol between the values that are worked out; the others stay 0. */
  stride?: 1 | 2;
}): Received {
  const { uniform, normal } = random(seed);
  const points = constellation(modulation.toLowerCase(), modulation === '16APSK' ? [2.85] : []);
  const pulse = Float64Array.from({ length: 2 * reach * rate + 1 }, (_, i) => rootPulse(i / rate - reach, rollOff));
  const sent = Array.from({ length: symbols }, () => points[Math.floor(uniform() * points.length)]!);
  const rail = (which: 0 | 1): Float64Array => {
    const air = new Float64Array(symbols * rate);
    const deviation = Math.sqrt(rate / (2 * esN0));
    for (let i = 0; i < air.length; i += 1) air[i] = deviation === 0 ? 0 : deviation * normal();
    sent.forEach((point, k) => addPulse(air, pulse, k * rate, point[which]));
    return filtered(air, pulse, stride);
  };
  return { symbols, rails: [rail(0), rail(1)] };
}

function addPulse(air: Float64Array, pulse: Float64Array, at: number, scale: number): void {
  for (let i = 0; i < pulse.length; i += 1) {
    const place = at + i - reach * rate;
    if (place >= 0 && place < air.length) air[place]! += scale * pulse[i]!;
  }
}

function filtered(air: Float64Array, pulse: Float64Array, stride: number): Float64Array {
  const out = new Float64Array(air.length);
  for (let n = 0; n < air.length; n += stride) {
    let sum = 0;
    for (let i = 0; i < pulse.length; i += 1) sum += pulse[i]! * (air[n + i - reach * rate] ?? 0);
    out[n] = sum / rate;
  }
  return out;
}

type Rail = (at: (symbols: number) => number) => number;
const sign = (value: number): number => (value < 0 ? -1 : 1);

/** The detectors as their definitions say, `at` being the rail so many symbols after the strobe. */
const rails: Record<string, Rail> = {
  gardner: (at) => at(-0.5) * (at(-1) - at(0)),
  'zero-crossing': (at) => at(-0.5) * (sign(at(-1)) - sign(at(0))),
  'mueller-muller': (at) => sign(at(-1)) * at(0) - sign(at(0)) * at(-1),
  'early-late': (at) => at(0.25) ** 2 - at(-0.25) ** 2,
};

/** Errors of a detector whose strobes come early by a multiple of ¼ symbol. */
export function timingErrors(signal: Received, detector: string, early: number): Float64Array {
  const of = rails[detector]!;
  const margin = 2 * reach;
  return Float64Array.from({ length: signal.symbols - 2 * margin }, (_, k) => {
    const strobe = (k + margin - early) * rate;
    return signal.rails.reduce((sum, rail) => sum + of((t) => rail[strobe + t * rate]!), 0);
  });
}

export const meanOf = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;

export function autocovariance(values: Float64Array, lag: number): number {
  const mean = meanOf(values);
  let sum = 0;
  for (let k = lag; k < values.length; k += 1) sum += (values[k]! - mean) * (values[k - lag]! - mean);
  return sum / (values.length - lag);
}
