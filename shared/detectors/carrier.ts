import { ParameterError } from '../parameter-error';
import type { CompleteCarrier } from '../plan/complete';
import { costasBpsk } from './carrier-costas';
import { decision } from './carrier-decision';
import { knownSymbols } from './carrier-known';
import { signOqpsk } from './carrier-offset-sign';
import { powerLaw } from './carrier-power-law';
import { signBpsk, signQpsk } from './carrier-sign';
import type { CarrierSignal, MakeCarrierModel } from './carrier-signal';
import type { DetectorModel } from './detector';
import { latest } from './latest';
import type { Modulation } from './modulations';

export type { CarrierSignal } from './carrier-signal';

type Detector = CompleteCarrier['detector'];

const kept = latest<DetectorModel>(16);

/** Every pair that makes sense. The first detector of a modulation is the one to recommend. */
const models: Record<Modulation, Partial<Record<Detector, MakeCarrierModel>>> = {
  BPSK: { sign: signBpsk, costas: costasBpsk, decision, 'power-law': powerLaw, 'known-symbols': knownSymbols },
  QPSK: { sign: signQpsk, decision, 'power-law': powerLaw, 'known-symbols': knownSymbols },
  OQPSK: { sign: signOqpsk },
  '8PSK': { decision, 'power-law': powerLaw, 'known-symbols': knownSymbols },
  '16QAM': { decision, 'power-law': powerLaw, 'known-symbols': knownSymbols },
  '64QAM': { decision, 'power-law': powerLaw, 'known-symbols': knownSymbols },
  '16APSK': { decision, 'known-symbols': knownSymbols },
  '32APSK': { decision, 'known-symbols': knownSymbols },
};

/** Detectors that lock to a modulation, the recommended one first. */
export const carrierDetectorsFor = (modulation: Modulation): Detector[] =>
  Object.keys(models[modulation]) as Detector[];

/**
 * The phase error detector of a carrier loop, as the datapath works it out: nothing is scaled but as written there.
 * The last few results are kept, so that a plan whose other values change is not worked out again.
 *
 * @throws {ParameterError} pointing at the detector when it cannot lock to the modulation, at the ring ratios when they
 *   do not fit, at Es/N0 when it leaves no slope
 */
export function carrierDetector(detector: Detector, signal: CarrierSignal): DetectorModel {
  const { modulation, amplitude, esN0, rollOff, ringRatios } = signal;
  const make = models[modulation][detector];
  if (!make) {
    const others = carrierDetectorsFor(modulation).join(' or ');
    throw new ParameterError('/carrier/detector', `${reasonAgainst(detector, modulation)}; take ${others}`);
  }
  const shape = modulation === 'OQPSK' ? rollOff : (ringRatios?.join() ?? '');
  return kept([detector, modulation, amplitude, esN0, shape].join(' '), () => make(signal));
}

function reasonAgainst(detector: Detector, modulation: Modulation): string {
  if (detector === 'costas') return 'costas is for BPSK only';
  if (modulation === 'OQPSK') {
    return `${detector} needs both rails at one strobe, and those of OQPSK lie half a symbol apart`;
  }
  if (detector === 'sign') return `sign tells the rails apart by sign alone, too little for ${modulation}`;
  return `the fourth powers of ${modulation} cancel but for its innermost ring`;
}
