import type { CarrierWords, ClockWords } from '../../../../shared/model/words';
import cases from '../../../reference/datapath-cases.json';

type Stored = number | string;

export interface CarrierCase {
  words: CarrierWords;
  steps: {
    x: [number, number];
    z: [number, number];
    updates: { e: Stored; acc: Stored; acc2: Stored; w: Stored; word: Stored }[];
    phase: Stored;
    stage: number;
  }[];
}

export interface ClockCase {
  words: ClockWords;
  steps: {
    x: [number, number];
    interpolants: { kind: string; mu: number; value: [number, number] }[];
    update?: { e: Stored; acc: Stored; acc2: Stored; w: Stored };
    stage?: number;
    eta: Stored;
  }[];
}

/**
 * Stimulus and every node for random configurations, worked out outside this project by two implementations
 * (unbounded integers, and C99 with 64-bit integers) that agree with each other.
 */
const all = cases as unknown as { words: CarrierWords | ClockWords }[];

export const allWords = all.map(({ words }) => words);

export const carrierCases = all.flatMap((each, index) =>
  each.words.loop === 'carrier' ? [{ name: `${index} ${each.words.detector}`, ...(each as CarrierCase) }] : [],
);

export const clockCases = all.flatMap((each, index) =>
  each.words.loop === 'clock' ? [{ name: `${index} ${each.words.detector}`, ...(each as ClockCase) }] : [],
);
