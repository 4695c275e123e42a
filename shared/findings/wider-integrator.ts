import { followedBy, setTo, twoDigitsUp } from './finding';
import type { Remedy } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** Range that a raised limit leaves beyond what is asked. */
const spareShare = 1.1;
const mostBits = 64;

/** How far an integrator has to reach and what bounds it, all in one unit. */
export interface IntegratorReach {
  asked: number;
  /** What the word alone would hold. */
  word: number;
  /** The plan's limit; undefined where the word alone bounds it. */
  limit: number | undefined;
  /** Where the limit stands in the loop. */
  limitPath: string;
  /** The limit in a sentence. */
  text: (limit: number) => string;
}

/** A higher limit where the word can hold it; else a wider word, and then the limit where that is too low as well. */
export function widerIntegrator(view: LoopView, { asked, word, limit, limitPath, text }: IntegratorReach) {
  const raised = twoDigitsUp(spareShare * asked);
  const no = numberOf(view, limitPath);
  if (limit !== undefined && word >= raised) return setTo(no, pointerOf(view, limitPath), raised, text(raised));
  const limitFalls = limit !== undefined && limit < asked;
  const wider = widerWord(view, (limitFalls ? raised : asked) / word);
  return wider && limitFalls ? followedBy(wider, `${no} to ${text(raised)}`) : wider;
}

function widerWord(view: LoopView, shortBy: number): Remedy | null {
  const path = 'arithmetic/integratorBits';
  const bits = view.loop.arithmetic.integratorBits + Math.max(1, Math.ceil(Math.log2(shortBy)));
  return bits <= mostBits ? setTo(numberOf(view, path), pointerOf(view, path), bits, `${bits} bits`) : null;
}
