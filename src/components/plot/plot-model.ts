/** Copper is the track stage, blue the acquire stage, ink the total or the measured, soft the theory. */
export type Tone = 'track' | 'acquire' | 'ink' | 'soft';

export interface Axis {
  label: string;
  unit?: string | undefined;
  scale?: 'linear' | 'log' | undefined;
  /** Taken as it is; without it the data decide. */
  domain?: readonly [number, number] | undefined;
  /** Taken as they are: the plan's own ±77.5 reads better than ±80. */
  ticks?: readonly number[] | undefined;
  /** Zero belongs to the axis: jitter, probability, margin. */
  zero?: boolean | undefined;
  /** As far below zero as above. */
  symmetric?: boolean | undefined;
  format?: ((value: number) => string) | undefined;
}

export interface Series {
  label: string;
  tone: Tone;
  /** x ascending. */
  points: readonly (readonly [number, number])[];
  dash?: boolean | undefined;
  thin?: boolean | undefined;
  /** x of the direct label; without it the widest gap is looked for. */
  labelAt?: number | undefined;
  /** No direct label. */
  quiet?: boolean | undefined;
  /** Band around the curve: x, low, high. */
  area?: readonly (readonly [number, number, number])[] | undefined;
}

/** A shaded range of x: what the plan asks for. */
export interface Band {
  from: number;
  to: number;
  label?: string | undefined;
}

export interface Limit {
  at: number;
  label: string;
  /** `y` draws a level line, `x` an upright one. */
  axis?: 'y' | 'x' | undefined;
  tone?: 'fail' | 'soft' | undefined;
}

export interface Marker {
  x: number;
  y: number;
  tone: Tone;
  /** Ends of the error bar. */
  low?: number | undefined;
  high?: number | undefined;
  /** Not yet run, or not a measurement. */
  hollow?: boolean | undefined;
  /** Not enough to say: hollow, in the colour of caution. */
  undecided?: boolean | undefined;
  label?: string | undefined;
  shape?: 'dot' | 'cross' | undefined;
}

/** A line that may turn back on itself: a root locus. It has no single height over x, and so no reading. */
export interface Path {
  label: string;
  tone: Tone;
  points: readonly (readonly [number, number])[];
  /** What changes along it, one value for each point. */
  along: readonly number[];
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
  paths?: readonly Path[] | undefined;
  /** What changes along the paths. */
  pathsOver?: string | undefined;
}

export const axisName = ({ label, unit }: Axis): string => [label, unit].filter(Boolean).join(', ');
