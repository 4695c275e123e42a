/** Copper is the track stage, blue the acquire stage, ink the total or the measured, soft the theory. */
export type Tone = 'track' | 'acquire' | 'ink' | 'soft';

export interface Axis {
  label: string;
  unit?: string;
  scale?: 'linear' | 'log';
  /** Taken as it is; without it the data decide. */
  domain?: readonly [number, number];
  /** Taken as they are: the plan's own ±77.5 reads better than ±80. */
  ticks?: readonly number[];
  /** Zero belongs to the axis: jitter, probability, margin. */
  zero?: boolean;
  /** As far below zero as above. */
  symmetric?: boolean;
  format?: (value: number) => string;
}

export interface Series {
  label: string;
  tone: Tone;
  /** x ascending. */
  points: readonly (readonly [number, number])[];
  dash?: boolean;
  thin?: boolean;
  /** x of the direct label; without it the widest gap is looked for. */
  labelAt?: number;
  /** No direct label. */
  quiet?: boolean;
  /** Band around the curve: x, low, high. */
  area?: readonly (readonly [number, number, number])[];
}

/** A shaded range of x: what the plan asks for. */
export interface Band {
  from: number;
  to: number;
  label?: string;
}

export interface Limit {
  at: number;
  label: string;
  /** `y` draws a level line, `x` an upright one. */
  axis?: 'y' | 'x';
  tone?: 'fail' | 'soft';
}

export interface Marker {
  x: number;
  y: number;
  tone: Tone;
  /** Ends of the error bar. */
  low?: number;
  high?: number;
  /** Not yet run, or not a measurement. */
  hollow?: boolean;
  /** Not enough to say: hollow, in the colour of caution. */
  undecided?: boolean;
  label?: string;
  shape?: 'dot' | 'cross';
}

export const toneClass: Readonly<Record<Tone, string>> = { track: 'trk', acquire: 'acq', ink: 'ink', soft: 'sof' };

/** Everything that a plot draws. */
export interface PlotData {
  x: Axis;
  y: Axis;
  series: readonly Series[];
  bands: readonly Band[];
  limits: readonly Limit[];
  markers: readonly Marker[];
}

export const axisName = ({ label, unit }: Axis): string => [label, unit].filter(Boolean).join(', ');
