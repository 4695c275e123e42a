import type {
  Acquisition,
  Budget,
  Detector,
  LoopDesign,
  LoopInteraction,
  StageJitter,
} from '../../../shared/model/design';
import { numberText } from '../../../shared/quantities/format';
import { present, whole, wholeHertz } from './group-rows';
import type { GainCell, GainGroup, GainRow } from './group-rows';

type Term = Exclude<StageJitter['dominant'], null>;

/** The terms of a budget as the sheet names them. */
const terms: { key: Term; label: string }[] = [
  { key: 'thermal', label: 'Noise' },
  { key: 'selfNoise', label: 'Pattern of the data' },
  { key: 'oscillator', label: 'Oscillator' },
  { key: 'phaseQuantisation', label: 'Phase quantisation' },
  { key: 'wordQuantisation', label: 'Word quantisation' },
  { key: 'drift', label: 'Drift, a standing error' },
];

export const termName = (term: Term): string => terms.find(({ key }) => key === term)!.label.toLowerCase();

/** Everything that a design says of a loop's errors, its limits and how it locks. */
export function budgetGroups(loop: LoopDesign): GainGroup[] {
  const columns = loop.stages.length;
  return [
    ...(loop.budget ? jitterGroups(loop.budget) : []),
    { title: 'Cost and bounds, last stage', rows: loop.budget ? boundRows(loop.budget, columns) : [] },
    { title: 'Detector at lock', rows: detectorRows(loop, columns) },
    { title: 'Interpolator', rows: interpolatorRows(loop, columns) },
    { title: 'Range and acquisition', rows: rangeRows(loop, columns) },
    { title: 'Lock detector', rows: lockRows(loop.acquisition, columns) },
  ].filter(({ rows }) => rows.length > 0);
}

function jitterGroups(budget: Budget): GainGroup[] {
  const { stages, limit, unit } = budget;
  const text = unit === 'deg' ? '°' : 'symbols';
  const style = { decimals: unit === 'deg' ? 3 : 6 };
  const rms = terms.map(({ key, label }): GainRow => ({
    label,
    unit: text,
    cells: stages.map((stage) => ({ value: stage[key], ...style })),
  }));
  const shares = terms.map(({ key, label }): GainRow => ({
    label,
    unit: '%',
    cells: stages.map((stage) => ({ value: shareOf(stage, key), decimals: 1 })),
  }));
  const total = { label: 'Total', unit: text, cells: stages.map((stage) => ({ value: stage.total, ...style })) };
  const most = { label: 'Limit', unit: text, cells: stages.map(() => ({ value: limit, ...style })) };
  return [
    { title: 'Jitter, rms', rows: [...present(rms), total, most] },
    { title: 'Share of the total, of its square', rows: present(shares) },
  ];
}

/** Share of a term in the mean square, %; null where either is not known. */
export function shareOf(stage: StageJitter, term: Term): number | null {
  const value = stage[term];
  return value === null || !stage.total ? null : 100 * (value / stage.total) ** 2;
}

function boundRows(budget: Budget, columns: number): GainRow[] {
  const put = (label: string, unit: string, cell: GainCell) => whole(columns, label, unit, cell);
  const { implementationLoss: loss, slip, nco, drift, best, unit } = budget;
  return present([
    put('Least total', unit === 'deg' ? '°' : 'symbols', {
      value: best?.total ?? null,
      decimals: unit === 'deg' ? 3 : 6,
    }),
    put('at BnT', '', { value: best?.noiseBandwidth ?? null, decimals: 6 }),
    put('Squaring loss', 'dB', { value: decibels(budget.squaringLoss), decimals: 2 }),
    put('Above the Cramér–Rao bound', 'dB', { value: decibels(budget.boundRatio), decimals: 2 }),
    put('Implementation loss', 'dB', { value: loss?.lossDb ?? null, decimals: 3 }),
    put('Symbol errors with jitter', '', { value: loss?.symbolErrorRate ?? null, significant: 3, exponent: true }),
    put('without', '', { value: loss?.idealSymbolErrorRate ?? null, significant: 3, exponent: true }),
    put('Worst spur of the NCO', 'dBc', { value: nco?.worstSpurDbc ?? null, decimals: 1 }),
    wholeHertz(columns, 'Doppler rate to follow', drift?.rateHzPerS || null, '/s'),
    put('Mean time to a slip, estimate', 's', { value: slip?.seconds ?? null, significant: 2, exponent: true }),
  ]);
}

const decibels = (ratio: number | null): number | null => (ratio === null ? null : 10 * Math.log10(ratio));

function detectorRows({ detector, words, resolutionHz }: LoopDesign, columns: number): GainRow[] {
  const put = (label: string, unit: string, cell: GainCell) => whole(columns, label, unit, cell);
  const trap = falseNull(detector);
  const turn = words.loop === 'carrier';
  return present([
    put('Slope Kd', turn ? 'per rad' : 'per symbol', { value: detector.gain, decimals: 4 }),
    put('Slope without noise', turn ? 'per rad' : 'per symbol', { value: detector.gainWithoutNoise, decimals: 4 }),
    put('Variance of the error', '', { value: detector.variance, decimals: 5 }),
    put('of it from the pattern', '', { value: detector.selfNoise || null, decimals: 5 }),
    put('Spectrum at 0 over variance', '', { value: whiteness(detector), decimals: 3 }),
    put('False null at ±', turn ? '°' : 'symbol', {
      value: trap && (turn ? (trap * 180) / Math.PI : trap),
      decimals: 2,
    }),
    wholeHertz(columns, 'One LSB of the word', resolutionHz),
  ]);
}

/** 1 for uncorrelated errors. */
const whiteness = ({ variance, spectrumAtZero, memoryless }: Detector): number | null =>
  memoryless || !variance || spectrumAtZero === null ? null : spectrumAtZero / variance;

/** The nearest place at which the loop settles out of lock. */
function falseNull({ nulls }: Detector): number | null {
  const places = nulls.filter(({ stable, lock }) => stable && !lock).map(({ x }) => Math.abs(x));
  return places.length ? Math.min(...places) : null;
}

function interpolatorRows({ interpolator }: LoopDesign, columns: number): GainRow[] {
  return present([
    whole(columns, 'Signal over error, random data', 'dB', {
      value: interpolator?.signalOverErrorDb ?? null,
      decimals: 1,
    }),
    whole(columns, 'Worst error in the band', 'dB', { value: interpolator?.worstErrorDb ?? null, decimals: 1 }),
  ]);
}

/** How far off the loop may start, and how long it takes. */
function rangeRows({ acquisition: of, stages }: LoopDesign, columns: number): GainRow[] {
  const put = (label: string, unit: string, value: number | null, decimals: number) =>
    whole(columns, label, unit, { value, decimals });
  const needed: GainRow = {
    label: 'Stage settles in',
    unit: 'symbols',
    cells: stages.map((_, index) => ({ value: of.stages[index]?.neededSymbols ?? null, decimals: 0 })),
  };
  const until: GainRow = {
    label: 'Stage runs for',
    unit: 'symbols',
    cells: stages.map((_, index) => ({ value: of.stages[index]?.untilSymbols ?? null, decimals: 0 })),
  };
  return present([
    wholeHertz(columns, 'Offset to expect', of.offsetHz || null),
    wholeHertz(columns, 'Unambiguous below', of.unambiguousHz),
    wholeHertz(columns, 'False locks every', of.falseLockSpacingHz),
    wholeHertz(columns, 'Offset held', of.largestOffsetHz),
    put('Rate error to expect', 'ppm', of.offsetPpm || null, 1),
    put('Rate error held', 'ppm', of.largestOffsetPpm, 1),
    wholeHertz(columns, 'Lock-in, estimate', of.lockInHz),
    put('Lock-in, estimate', 'ppm', of.lockInPpm, 1),
    wholeHertz(columns, 'Pull-out, estimate', of.pullOutHz),
    wholeHertz(columns, 'Pull-in range, estimate', of.pullInRangeHz),
    put('Pull-in, estimate', 'symbols', of.pullInSymbols || null, 0),
    needed,
    until,
    put('All stages, estimate', 'symbols', of.totalSymbols, 0),
  ]);
}

function lockRows({ lockDetector }: Acquisition, columns: number): GainRow[] {
  if (!lockDetector) return [];
  const put = (label: string, cell: GainCell) => whole(columns, label, '', cell);
  const rare = { significant: 2, exponent: true };
  return [
    whole(columns, 'Block', 'symbols', { value: lockDetector.averagingSymbols, decimals: 0 }),
    put('Metric in lock', { value: lockDetector.meanLocked, decimals: 3 }),
    put('± in lock', { value: lockDetector.deviationLocked, decimals: 3 }),
    put('± out of lock', { value: lockDetector.deviationUnlocked, decimals: 3 }),
    ...lockDetector.thresholds.flatMap(({ stage, threshold, falseAlarm, miss }) => {
      const of = stage === null ? '' : `, ${stage}`;
      return [
        put(`Threshold${of}`, { value: threshold, decimals: 3 }),
        put(`False alarm a block${of}`, { value: falseAlarm, ...rare }),
        put(`Miss a block${of}`, { value: miss, ...rare }),
      ];
    }),
  ];
}

/** What the two loops do to each other. */
export function interactionRows(of: LoopInteraction): GainRow[] {
  return present([
    whole(1, 'Bandwidth, carrier over clock', '', { value: of.bandwidthRatio, decimals: 2 }),
    whole(1, 'Phase jitter from timing', '° rms', { value: of.carrierFromTimingDeg, decimals: 3 }),
    whole(1, 'Loss from timing', 'dB', { value: of.lossFromTimingDb, decimals: 3 }),
    whole(1, 'Timing slope left by phase jitter', '', { value: of.clockGainFromPhase, decimals: 4 }),
  ]);
}

/** Which loop may start before the other has locked. */
export const startText = ({ startFirst }: LoopInteraction): string =>
  ({
    carrier: 'The carrier loop can start first; clock recovery needs it locked.',
    clock: 'Clock recovery can start first; the carrier loop needs it locked.',
    either: 'Either loop can start before the other has locked.',
    neither: 'Each loop needs the other locked: start one of them on known symbols.',
  })[startFirst];

/** The largest term of the last stage in a sentence; undefined where there is no budget. */
export function dominantText({ budget }: LoopDesign): string | undefined {
  const last = budget?.stages.at(-1);
  if (!budget || !last?.dominant || last.total === null) return undefined;
  const share = numberText(shareOf(last, last.dominant) ?? 0, { decimals: 0 });
  const over = last.total > budget.limit ? 'above' : 'within';
  return `Stage ${last.stage} is ${over} its limit; its largest term is ${termName(last.dominant)}, ${share} % of the mean square.`;
}
