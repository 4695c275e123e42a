import { numberText } from '../../../shared/quantities/format';
import type { ReplayTrace } from '../../api/replays';
import type { Axis, Limit } from '../plot/plot-model';
import type { Figure } from './lock-figures';
import type { OffsetScale } from './offset-scale';

/** Three strips over the same symbols: what the loop holds, how far off it is, what the NCO is told. */
export function traceFigures(
  trace: ReplayTrace,
  offsetHz: number,
  scale: OffsetScale,
): (Figure & { height: number })[] {
  const x: Axis = { label: 'symbols', domain: [0, trace.symbols] };
  const events = eventsOf(trace);
  // The lines run through all three strips; their names stand in the first.
  const unnamed = events.map((event) => ({ ...event, label: '' }));
  const strip = (title: string, values: readonly number[], tone: 'track' | 'ink', ticks?: number[]) => ({
    bands: [],
    markers: [],
    title,
    x,
    y: { label: title, ...(ticks && { ticks }) },
    height: 112,
    series: [
      {
        label: title,
        tone,
        thin: true,
        quiet: true,
        points: values.map((value, at) => [trace.symbol[at] ?? 0, value] as const),
      },
    ],
    limits: unnamed,
  });
  const inUnit = (values: readonly number[]) => values.map((hertz) => scale.of(hertz));
  const applied = offsetHz === 0 || trace.outcome !== 'locked' ? undefined : [0, scale.of(offsetHz)];
  return [
    { ...strip(`Integrator, ${scale.unit}`, inUnit(trace.integratorHz), 'track', applied), limits: events },
    strip('Phase error, °', trace.phaseErrorDeg, 'ink'),
    strip(`NCO word, ${scale.unit}`, inUnit(trace.frequencyHz), 'ink', applied),
  ];
}

function eventsOf(trace: ReplayTrace): Limit[] {
  const upright = (at: number, label: string): Limit => ({ at, label, tone: 'soft', axis: 'x' });
  const locked = trace.lockedAtSymbol;
  const switches = trace.stage.flatMap((stage, at) =>
    at > 0 && stage !== trace.stage[at - 1] ? [trace.symbol[at] ?? 0] : [],
  );
  return [
    ...(locked === null ? [] : [upright(locked, `locked at ${numberText(locked)}`)]),
    ...switches.map((at) => upright(at, 'stage switch')),
  ];
}

/** What became of a trial, in one sentence. */
export function traceSentence({ outcome, lockedAtSymbol, symbols }: ReplayTrace): string {
  const of = `${numberText(symbols)} symbols`;
  if (outcome === 'locked')
    return `Locked at symbol ${numberText(lockedAtSymbol ?? 0)} of ${of}, and it holds to the end.`;
  if (outcome === 'false-lock')
    return `The error is quiet at the end of ${of}, but the frequency or the phase is wrong: false lock.`;
  return `Not locked within ${of}.`;
}
