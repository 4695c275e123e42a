import type { Finding } from '../model/design';
import type { GainWord } from '../model/design';
import { gainOf, gainWord } from '../fixed-point/gain-words';
import { errorLsb } from '../fixed-point/loop-scale';
import { dominantDamping } from '../loop/dominant-pair';
import { linearLoop } from '../loop/linear-loop';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import { averagedSymbols } from '../loop/stage-loop';
import { finding, followedBy, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { numberOf, pointerOf, stageName, stageViews, worstStage } from './loop-view';
import type { LoopView, StageView } from './loop-view';

const mostMantissaBits = 32;

export const quantisationFindings = (view: LoopView): Finding[] => [
  ...vanishing(view),
  ...error(view, {
    slug: 'quantisation.bandwidth',
    measure: 'noiseBandwidth',
    sound: `Words keep the ${view.key}’s bandwidth`,
    fault: `Words miss the ${view.key}’s bandwidth`,
    word: 'BnT',
    limit: 'bandwidthError',
  }),
  ...error(view, {
    slug: 'quantisation.damping',
    measure: 'damping',
    sound: `Words keep the ${view.key}’s damping factor`,
    fault: `Words miss the ${view.key}’s damping factor`,
    word: 'a damping factor of',
    limit: 'dampingError',
  }),
];

interface ErrorCheck {
  slug: string;
  measure: 'noiseBandwidth' | 'damping';
  sound: string;
  fault: string;
  word: string;
  limit: 'bandwidthError' | 'dampingError';
}

function error(view: LoopView, check: ErrorCheck): Finding[] {
  const worst = worstStage(view, ({ result }) => {
    const of = check.measure === 'damping' ? result.dampingError : result.bandwidthError;
    return of === null ? null : 100 * Math.abs(of);
  });
  if (!worst) return [];
  const limit = 100 * view.plan.limits[check.limit];
  const severity: Severity = worst.value > limit ? 'fail' : 'pass';
  const { exact, effective } = worst.at.result[check.measure] as { exact: number; effective: number };
  return [
    finding({
      slug: check.slug,
      severity,
      title: passed(severity, check.sound, check.fault),
      value: worst.value,
      limit,
      sense: 'max',
      unit: '%',
      reason: `${stageName(worst.at)} has ${check.word} ${say(effective, 5)} from its integers, ${say(exact, 5)} from its gains.`,
      ...remedyUnless(severity, () => finerWords(view)),
      fields: [
        pointerOf(view, 'arithmetic/mantissaBits'),
        pointerOf(view, 'arithmetic/gainForm'),
        `/limits/${check.limit}`,
      ],
      source: 'from the words, exact',
    }),
  ];
}

/** A multiplier with the fewest mantissa bits with which every stage keeps both limits. */
export function finerWords(view: LoopView): Remedy | null {
  const { gainForm, mantissaBits } = view.loop.arithmetic;
  const set = (path: string, value: string | number, text: string): Remedy =>
    setTo(numberOf(view, path), pointerOf(view, path), value, text);
  if (gainForm === 'multiplier') {
    const bits = fewestBits(view, mantissaBits + 1);
    return bits === null ? null : set('arithmetic/mantissaBits', bits, `${bits} bits`);
  }
  const multiplier = set('arithmetic/gainForm', 'multiplier', 'multiplier');
  const bits = fewestBits(view, mantissaBits) ?? mantissaBits;
  return bits === mantissaBits
    ? multiplier
    : followedBy(multiplier, `${numberOf(view, 'arithmetic/mantissaBits')} to ${bits} bits`);
}

function fewestBits(view: LoopView, from: number): number | null {
  for (let bits = from; bits <= mostMantissaBits; bits += 1) {
    if (stageViews(view).every((at) => keepsLimits(at, bits))) return bits;
  }
  return null;
}

function keepsLimits(at: StageView, mantissaBits: number): boolean {
  const { g1, g2, g3 = 0 } = at.result.gains;
  const ratio = (name: 'proportional' | 'integral' | 'integral2'): number => {
    const gain = wantedWordGain(at, name);
    return gain === 0 ? 1 : gainOf(gainWord({ gain, form: 'multiplier', mantissaBits })) / gain;
  };
  const gains = { g1: g1 * ratio('proportional'), g2: g2 * ratio('integral'), g3: g3 * ratio('integral2') };
  const { delay, updateInterval } = at.loop;
  const loop = linearLoop({ gains, delay, averaged: averagedSymbols(updateInterval) });
  const bandwidth = noiseBandwidth(loop);
  const damping = dominantDamping(loop)?.damping ?? null;
  const { noiseBandwidth: wide, damping: damped } = at.result;
  return (
    isNear(bandwidth && bandwidth / updateInterval, wide.exact, at.plan.limits.bandwidthError) &&
    isNear(damping, damped.exact, at.plan.limits.dampingError)
  );
}

const isNear = (value: number | null, wanted: number | null, share: number): boolean =>
  wanted === null || (value !== null && Math.abs(value / wanted - 1) <= share);

/** The real gain behind a word, LSB of its node per error LSB. */
function wantedWordGain({ loop, result }: StageView, name: 'proportional' | 'integral' | 'integral2'): number {
  const { guardBits, guard2Bits } = loop.arithmetic;
  const guard = name === 'proportional' ? 0 : name === 'integral' ? guardBits : guardBits + guard2Bits;
  return (result.gains[name] ?? 0) * errorLsb(loop.arithmetic) * 2 ** guard;
}

/** A gain too small for its word is silently no gain at all. */
function vanishing(view: LoopView): Finding[] {
  const lost = stageViews(view).flatMap((at) => lostGains(at).map((name) => ({ at, name })));
  const severity: Severity = lost.length ? 'fail' : 'pass';
  const first = lost[0];
  const reason = first
    ? `${stageName(first.at)} asks for ${say(wantedWordGain(first.at, first.name))} LSB per error LSB, less than half the least gain there is: the word is 0.`
    : 'Every gain that is asked for has a word other than 0.';
  return [
    finding({
      slug: 'quantisation.gain-vanishes',
      severity,
      title: passed(severity, `${view.title} keeps all its gains`, `${view.title} loses a gain altogether`),
      reason,
      ...remedyUnless(severity, () => ({
        remedy: `Widen ${numberOf(view, view.key === 'carrier' ? 'nco/widthBits' : 'counter/widthBits')}${first?.name === 'proportional' ? '' : ` or ${numberOf(view, 'arithmetic/guardBits')}`}.`,
        change: null,
      })),
      fields: [pointerOf(view, 'arithmetic/guardBits'), pointerOf(view, 'arithmetic/mantissaBits')],
      source: 'from the words, exact',
    }),
  ];
}

function lostGains({ result: { gains, words } }: StageView): ('proportional' | 'integral')[] {
  const isLost = (gain: number, word: GainWord | undefined): boolean => gain > 0 && word?.mantissa === 0;
  const lost: ('proportional' | 'integral')[] = [];
  if (isLost(gains.proportional, words.proportional)) lost.push('proportional');
  if (isLost(gains.integral, words.integral)) lost.push('integral');
  return lost;
}
