import type { Budget, StageJitter } from '../model/design';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import type { LinearLoop } from '../loop/linear-loop';
import { jitterTerms } from './jitter';
import type { Disturbances, JitterTerms } from './jitter';
import { leastJitter, rms, sweepAround, toSweep } from './jitter-sweep';
import type { LoopFamily } from './loop-family';
import { shortened } from './update-covariance';
import type { WordNoise } from './word-noise';

export interface JitterInput {
  /** Unquantised loops of the stages, with their names and what their words' rounding adds. */
  stages: { name: string; loop: LinearLoop; words: WordNoise }[];
  /** The last stage's loop with any bandwidth. */
  family: LoopFamily;
  /** What disturbs every stage. */
  disturbances: Omit<Disturbances, 'words'>;
  /** The sheet's unit over that of the phase. */
  scale: number;
}

/** The last stage, in the unit of the phase. */
export interface LastStage {
  loop: LinearLoop;
  terms: JitterTerms;
  /** BnT per symbol; null for an unstable loop. */
  noiseBandwidth: number | null;
}

/** Jitter of every stage, and of the last one over its bandwidth. */
export function jitterBudget({ stages, family, disturbances, scale }: JitterInput): {
  jitter: Pick<Budget, 'stages' | 'sweep' | 'best'>;
  last: LastStage;
} {
  const terms = stages.map(({ loop, words }) => jitterTerms(loop, { ...disturbances, words }));
  const { loop, words } = stages.at(-1) as JitterInput['stages'][number];
  const own = noiseBandwidth(loop);
  const input = { family, disturbances: { ...drawn(disturbances), words }, own: own ?? 0 };
  const swept = own === null ? [] : sweepAround(input);
  return {
    jitter: {
      stages: stages.map(({ name }, i) => stageJitter(name, terms[i] as JitterTerms, scale)),
      sweep: toSweep(swept, scale),
      best: leastJitter(input, swept, scale),
    },
    last: { loop, terms: terms.at(-1) as JitterTerms, noiseBandwidth: own && own / disturbances.updateInterval },
  };
}

/** What a curve is drawn from: of a long covariance so many lags as show. */
const drawn = (disturbances: JitterInput['disturbances']): JitterInput['disturbances'] => ({
  ...disturbances,
  error: disturbances.error && shortened(disturbances.error, drawnLags),
  self: shortened(disturbances.self, drawnLags),
});

const drawnLags = 8;

const termNames = ['thermal', 'selfNoise', 'oscillator', 'phaseQuantisation', 'wordQuantisation', 'drift'] as const;

function stageJitter(stage: string, terms: JitterTerms, scale: number): StageJitter {
  const of = (term: keyof JitterTerms) => rms(terms[term], scale);
  return {
    stage,
    thermal: of('thermal'),
    selfNoise: of('selfNoise'),
    oscillator: of('oscillator'),
    phaseQuantisation: of('phaseQuantisation'),
    wordQuantisation: of('wordQuantisation'),
    drift: of('drift'),
    total: of('total'),
    dominant: dominantOf(terms),
  };
}

function dominantOf(terms: JitterTerms): StageJitter['dominant'] {
  if (terms.total === null) return null;
  return termNames.reduce((top, term) => ((terms[term] ?? 0) > (terms[top] ?? 0) ? term : top));
}
