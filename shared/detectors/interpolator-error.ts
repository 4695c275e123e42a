import { bankTable } from '../fixed-point/interpolator-table';
import { boundedMemo } from '../math/bounded-memo';
import { gaussLegendre } from '../math/gauss-legendre';
import type { InterpolatorError } from '../model/design';
import { interpolatorTaps } from './interpolator';
import type { InterpolatorName } from './interpolator';
import { tapPlaces } from './polyphase-bank';
import type { BankSignal } from './polyphase-bank';
import { pulseAutocorrelation, raisedCosineSpectrum } from './pulse';

export interface InterpolatorInput extends BankSignal {
  interpolator: InterpolatorName;
  /** Bits F of the fractional interval. */
  fractionBits: number;
  /** Width Wt of a coefficient. */
  tableBits: number;
}

/** What an interpolator adds to random data whose timing is arbitrary; errors of every fraction alike. */
export const interpolatorError = boundedMemo(
  errorOf,
  ({ interpolator, rollOff, samplesPerSymbol, fractionBits, tableBits }) =>
    JSON.stringify([interpolator, rollOff, samplesPerSymbol, fractionBits, tableBits]),
  16,
);

/** Fractions up to ½ say it all: those beyond are the same turned round. */
const fractionNodes = gaussLegendre(6);
const bandNodes = gaussLegendre(12);
const curvePoints = 49;

/** One frequency of the spectrum, cycles per sample, and its share of the signal's power. */
interface SpectralLine {
  frequency: number;
  power: number;
}

function errorOf({ interpolator, fractionBits, tableBits, ...signal }: InterpolatorInput): InterpolatorError {
  const taps = interpolatorTaps(interpolator, signal);
  const bandEdge = (1 + signal.rollOff) / (2 * signal.samplesPerSymbol);
  const lines = spectrum(signal);
  const meanError = meanSquaredError(taps);
  const frequency = spaced(curvePoints, Math.max(0.5, bandEdge));
  const error = lines.reduce((sum, line) => sum + line.power * meanError(line.frequency), 0);
  return {
    signalOverErrorDb: -decibels(error),
    tableSignalOverErrorDb: -decibels(tableError({ signal, taps, fractionBits, tableBits, lines })),
    worstErrorDb: decibels(worstError(taps, bandEdge)),
    frequency,
    errorDb: frequency.map((f) => shown(meanError(f))),
    bandEdge,
  };
}

const decibels = (ratio: number): number => 10 * Math.log10(Math.max(ratio, 1e-30));

/** A line of the plot; no error, or rounding alone, is none. */
const shown = (ratio: number): number | null => (ratio > 1e-29 ? decibels(ratio) : null);

const spaced = (count: number, last: number): number[] =>
  Array.from({ length: count }, (_, i) => (last * i) / (count - 1));

type TapsAt = (mu: number) => number[];

/** |e^(j2πfμ) − Σ h_n e^(j2πfn)|² of the frequency whose e^(j2πf) is given with its square. */
function squaredError(h: readonly number[], mu: number, { frequency, once, twice }: Turns): number {
  const re = Math.cos(2 * Math.PI * frequency * mu) - (h[0]! + h[2]!) * once[0] - h[1]! - h[3]! * twice[0];
  const im = Math.sin(2 * Math.PI * frequency * mu) + (h[0]! - h[2]!) * once[1] - h[3]! * twice[1];
  return re * re + im * im;
}

interface Turns {
  frequency: number;
  once: readonly [number, number];
  twice: readonly [number, number];
}

function turnsOf(frequency: number): Turns {
  const [c, s] = [Math.cos(2 * Math.PI * frequency), Math.sin(2 * Math.PI * frequency)];
  return { frequency, once: [c, s], twice: [c * c - s * s, 2 * c * s] };
}

/** Mean over all fractions, as a function of the frequency. */
function meanSquaredError(taps: TapsAt): (frequency: number) => number {
  const responses = Array.from(fractionNodes.nodes, (node, i) => {
    const mu = (1 + node) / 4;
    return { mu, h: taps(mu), weight: fractionNodes.weights[i]! / 2 };
  });
  return (frequency) => {
    const turns = turnsOf(frequency);
    return responses.reduce((sum, { mu, h, weight }) => sum + weight * squaredError(h, mu, turns), 0);
  };
}

function worstError(taps: TapsAt, bandEdge: number): number {
  const lines = spaced(9, bandEdge).map(turnsOf);
  const errors = spaced(17, 0.5).flatMap((mu) => {
    const h = taps(mu);
    return lines.map((turns) => squaredError(h, mu, turns));
  });
  return Math.max(...errors);
}

/** Spectrum of random data after the matched filter, G², as lines whose powers add up to 1. */
function spectrum({ rollOff, samplesPerSymbol }: BankSignal): SpectralLine[] {
  const corner = (1 - rollOff) / 2;
  const total = pulseAutocorrelation(0, rollOff);
  const band = (from: number, to: number): SpectralLine[] =>
    Array.from(bandNodes.nodes, (node, i) => {
      const f = from + ((to - from) * (1 + node)) / 2;
      const density = raisedCosineSpectrum(f, rollOff) ** 2;
      // Both signs of f.
      return { frequency: f / samplesPerSymbol, power: (bandNodes.weights[i]! * (to - from) * density) / total };
    });
  return [...band(0, corner), ...band(corner, corner + rollOff)];
}

interface DatapathTable {
  signal: BankSignal;
  taps: TapsAt;
  fractionBits: number;
  tableBits: number;
  lines: readonly SpectralLine[];
}

/** Longer tables are looked at in steps: their roundings are alike. */
const mostFractions = 256;

/**
 * Error of the datapath's own table over the signal: rounded coefficients at each of its fractions, which it takes for
 * the whole interval up to the next one. Half such an interval is a constant delay, which the loop takes up.
 */
function tableError({ signal, taps, fractionBits, tableBits, lines }: DatapathTable): number {
  const count = Math.min(2 ** fractionBits, mostFractions);
  const fractions = Array.from({ length: count }, (_, k) => k / count);
  const table = bankTable(fractions.map(taps), tableBits).map((h) => h.map((tap) => tap / 2 ** (tableBits - 2)));
  const grid = correlationGrid(signal, count);
  const error = table.reduce((sum, h, k) => sum + quadraticError(h, k / count, grid), 0);
  const slope = lines.reduce((sum, line) => sum + line.power * (2 * Math.PI * line.frequency) ** 2, 0);
  return Math.max(error / count, 0) + slope / 4 ** fractionBits / 12;
}

type CorrelationGrid = ReturnType<typeof correlationGrid>;

/** Autocorrelation of the signal over its power between places that are multiples of 1/count sample. */
function correlationGrid({ rollOff, samplesPerSymbol }: BankSignal, count: number) {
  const power = pulseAutocorrelation(0, rollOff);
  const values = Float64Array.from(
    { length: 3 * count + 1 },
    (_, i) => pulseAutocorrelation(i / count / samplesPerSymbol, rollOff) / power,
  );
  return { between: (a: number, b: number): number => values[Math.round(Math.abs(a - b) * count)]! };
}

/** 1 − 2 Σ h_n r(n − μ) + ΣΣ h_n h_m r(n − m). */
function quadraticError(table: readonly number[], mu: number, { between }: CorrelationGrid): number {
  let error = 1;
  for (let i = 0; i < 4; i += 1) {
    error -= 2 * table[i]! * between(tapPlaces[i]!, mu);
    for (let j = 0; j < 4; j += 1) error += table[i]! * table[j]! * between(tapPlaces[i]!, tapPlaces[j]!);
  }
  return error;
}
