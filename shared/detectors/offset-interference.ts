import { raisedCosine } from './pulse';

/** g(lag + ½): what a symbol leaves on its own rail half-way to the next strobe and beyond. */
export const tapAt = (lag: number, rollOff: number): number => raisedCosine(lag + 0.5, rollOff);

/** Σ g²(k + ½) over all k: 1 − α/2. */
export const tapPower = (rollOff: number): number => 1 - rollOff / 2;

/** Half-way sample of a rail of symbols ±1/√2: the sum of one of the atoms and a normal variable. */
export interface Interference {
  values: Float64Array;
  /** Probabilities of the values, sum 1. */
  weights: Float64Array;
  /** Variance of the normal variable. */
  rest: number;
}

type Atom = readonly [value: number, weight: number];

/** Pairs of nearest symbols whose patterns are told apart; all others together are taken as normal. */
const pairs = 4;

/**
 * The rail half-way between its strobes: Σ ±g(k + ½)/√2. The two symbols at one distance give twice their tap, nothing
 * or minus twice it with weights ¼, ½, ¼.
 *
 * @param known whether one of the two nearest symbols is left out, as known
 */
export function interference(rollOff: number, known = false): Interference {
  let atoms: Atom[] = [[0, 1]];
  let rest = tapPower(rollOff) / 2;
  for (let k = 0; k < pairs; k += 1) {
    const tap = Math.SQRT1_2 * tapAt(k, rollOff);
    rest -= 2 * tap ** 2;
    atoms = known && k === 0 ? withSymbol(atoms, tap) : withPair(atoms, tap);
  }
  return {
    values: Float64Array.from(atoms, ([value]) => value),
    weights: Float64Array.from(atoms, ([, weight]) => weight),
    rest: Math.max(rest, 0),
  };
}

const withSymbol = (atoms: Atom[], tap: number): Atom[] =>
  atoms.flatMap(([value, weight]): Atom[] => [
    [value - tap, weight / 2],
    [value + tap, weight / 2],
  ]);

const withPair = (atoms: Atom[], tap: number): Atom[] =>
  atoms.flatMap(([value, weight]): Atom[] => [
    [value - 2 * tap, weight / 4],
    [value, weight / 2],
    [value + 2 * tap, weight / 4],
  ]);
