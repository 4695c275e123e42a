import { requiredOffsetHz } from '../../../shared/plan/required-offset';
import { leastTrials } from '../../../shared/replay/least-trials';
import type { ToleranceCheck } from '../../../shared/model/tolerance-check';
import type { Plan } from '../../../shared/model/plan';
import type { CompleteCheck } from '../../api/replays';

/** A check under edit: a number that cannot be read is undefined. */
export interface CheckForm {
  name: string;
  startHz: number | undefined;
  stopHz: number | undefined;
  points: number | undefined;
  /** As typed: one or more numbers, parted by commas or spaces. */
  esN0Text: string;
  symbols: number | undefined;
  trials: number | undefined;
  seed: number | undefined;
  lockProbability: number | undefined;
  confidence: number | undefined;
}

const defaults: CheckForm = {
  name: 'Carrier offset, both ends',
  startHz: undefined,
  stopHz: undefined,
  points: 21,
  esN0Text: '10',
  symbols: 20_000,
  trials: 400,
  seed: 1,
  lockProbability: 0.99,
  confidence: 0.95,
};

/** The check that a plan itself asks for: its whole tolerance at its own Es/N0, long enough for every stage. */
export function suggestedForm(plan: Plan): CheckForm {
  const required = requiredOffsetHz(plan.environment ?? {}) || undefined;
  const stages = plan.carrier?.stages ?? [];
  const acquiring = stages.reduce((sum, { until }) => sum + (until?.symbols ?? 0), 0);
  return {
    ...defaults,
    startHz: required && -required,
    stopHz: required,
    esN0Text: String(plan.signal.esN0Db ?? 10),
    symbols: Math.min(1_000_000, Math.max(defaults.symbols ?? 0, 2 * acquiring)),
  };
}

export const formOf = (check: CompleteCheck): CheckForm => ({
  name: check.name,
  startHz: check.carrierOffsetHz.start,
  stopHz: check.carrierOffsetHz.stop,
  points: check.carrierOffsetHz.points,
  esN0Text: check.esN0Db.join(', '),
  symbols: check.symbols,
  trials: check.trials,
  seed: check.seed,
  lockProbability: check.limits.lockProbability,
  confidence: check.limits.confidence,
});

/** Numbers of a list such as “6.5, 10” or “6.5 10”; undefined when a part of it is no number. */
export function readEsN0(text: string): number[] | undefined {
  const parts = text
    .replace(/\u2212/g, '-')
    .replace(/dB/gi, ' ')
    .split(/[\s,;]+/)
    .filter(Boolean);
  const values = parts.map(Number);
  if (esN0Doubt(text) !== undefined) return undefined;
  return values.length > 0 && values.every(Number.isFinite) ? values : undefined;
}

/**
 * The question to ask of a list in which a comma may be the decimal point: “6,5” is 6.5, or 6 and 5.
 * Space behind the comma, a point, or a third number leave one reading.
 */
export function esN0Doubt(text: string): string | undefined {
  const pair = text
    .replace(/dB/gi, ' ')
    .split(/[\s;]+/)
    .map((part) => /^([-\u2212]?\d+),(\d+)$/.exec(part))
    .find((match) => match !== null);
  if (!pair) return undefined;
  const [typed, first, second] = pair;
  return `${typed}: ${first}.${second}, or ${first} and ${second}? Type ${first}.${second} or ${first}, ${second}.`;
}

/** The check to send; undefined while something in the form cannot be read. */
export function checkOf(form: CheckForm): ToleranceCheck | undefined {
  const { name, startHz, stopHz, points, symbols, trials, seed, lockProbability, confidence } = form;
  const esN0Db = readEsN0(form.esN0Text);
  if (startHz === undefined || stopHz === undefined || !points || !esN0Db || !symbols || !trials) return undefined;
  if (seed === undefined || lockProbability === undefined || confidence === undefined) return undefined;
  return {
    name,
    carrierOffsetHz: { start: startHz, stop: stopHz, points },
    esN0Db,
    symbols,
    trials,
    seed,
    limits: { lockProbability, confidence },
  };
}

/** Symbols that a check simulates over all its points and trials. */
export function symbolCount(form: CheckForm): number | undefined {
  const levels = readEsN0(form.esN0Text)?.length;
  const { points, symbols, trials } = form;
  return points && symbols && trials && levels ? points * levels * trials * symbols : undefined;
}

/** Fewest trials that could pass, when the form has fewer; undefined when it has enough or cannot be read. */
export function missingTrials({ trials, lockProbability, confidence }: CheckForm): number | undefined {
  if (trials === undefined || lockProbability === undefined || confidence === undefined) return undefined;
  if (lockProbability < 0 || lockProbability > 1 || confidence <= 0 || confidence >= 1) return undefined;
  const least = leastTrials({ lockProbability, confidence });
  return trials < least ? least : undefined;
}

const mostTrials = 10_000;

/** Trials with which an undecided check has a fair chance to decide: three times as many, and more than the fewest. */
export function trialsToDecide({ trials, limits }: CompleteCheck): number {
  const least = leastTrials(limits);
  const wanted = Math.max(3 * trials, Number.isFinite(least) ? 1.2 * least : 0);
  return Math.min(mostTrials, 100 * Math.ceil(wanted / 100));
}
