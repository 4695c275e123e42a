import type { CarrierWords } from '../../model/words';
import { ParameterError } from '../../parameter-error';
import type { DecisionTable } from '../tables';
import { powerLawShift } from './phase-detector';

/** Detector value of one symbol in doubles. */
export type DetectorDoubles = (zI: number, zQ: number, known: number) => number;

export function detectorInDoubles(words: CarrierWords, decision?: DecisionTable): DetectorDoubles {
  if (words.detector === 'costas') return (i, q) => i * q;
  if (words.detector === 'sign') {
    if (words.modulation === 'bpsk') return (i, q) => (i < 0 ? -q : q);
    return (i, q) => (i < 0 ? -q : q) - (q < 0 ? -i : i);
  }
  if (words.detector === 'power-law') return powerLaw(words);
  if (!decision) throw new ParameterError('tables', 'this detector needs its decision table');
  return pointDetector(words.detector === 'known-symbols', decision);
}

function powerLaw(words: CarrierWords): DetectorDoubles {
  const cut = powerLawShift(words);
  const power = words.power!;
  const sign = words.powerSign!;
  return (i, q) => {
    let re = i >> cut;
    let im = q >> cut;
    for (let done = 1; done < power; done *= 2) {
      const square = re * re - im * im;
      im = 2 * re * im;
      re = square;
    }
    return sign * im;
  };
}

function pointDetector(known: boolean, { references, received }: DecisionTable): DetectorDoubles {
  const decide = (i: number, q: number): number => {
    let least = Infinity;
    let index = 0;
    for (let k = 0; k < received.length; k++) {
      const [pI, pQ] = received[k]!;
      const distance = (i - pI) * (i - pI) + (q - pQ) * (q - pQ);
      if (distance < least) {
        least = distance;
        index = k;
      }
    }
    return index;
  };
  return (i, q, symbol) => {
    const [aI, aQ] = references[known ? symbol : decide(i, q)]!;
    return q * aI - i * aQ;
  };
}
