const psk = ['BPSK', 'QPSK', '8PSK'];

/** Modulations that each carrier detector is for; the others it cannot lock to. */
const modulationsOf: Record<string, readonly string[]> = {
  costas: ['BPSK'],
  sign: ['BPSK', 'QPSK', 'OQPSK'],
  decision: [...psk, '16QAM', '64QAM', '16APSK', '32APSK'],
  'power-law': [...psk, '16QAM', '64QAM'],
  'known-symbols': [...psk, '16QAM', '64QAM', '16APSK', '32APSK'],
};

/** Carrier detectors that a modulation rules out. */
export const detectorsWithout = (modulation: string): string[] =>
  Object.keys(modulationsOf).filter((detector) => !modulationsOf[detector]!.includes(modulation));
