/** One numbered field of the plan sheet. Numbers are stable: a field that is not shown keeps its number. */
export interface PlanField {
  /** Number on the sheet: fold and position, for example `2.18`. */
  no: string;
  /** JSON pointer into the plan; `*` stands for the index of a stage. */
  pointer: string;
  label: string;
  /** Unit of the value in the plan; empty where dimensionless. */
  unit: string;
  /** The value is the magnitude of both signs: ±20 ppm. */
  symmetric?: true;
}

const field = (no: string, pointer: string, label: string, unit = ''): PlanField => ({ no, pointer, label, unit });
const bothSigns = (entry: PlanField): PlanField => ({ ...entry, symmetric: true });

const signal = [
  field('1.1', '/signal/modulation', 'Modulation'),
  field('1.2', '/signal/symbolRateBd', 'Symbol rate', 'Bd'),
  field('1.3', '/signal/samplesPerSymbol', 'Samples per symbol'),
  field('1.4', '/signal/rollOff', 'Roll-off α'),
  field('1.5', '/signal/esN0Db', 'Es/N0 at work', 'dB'),
  field('1.6', '/signal/amplitude', 'Amplitude'),
  bothSigns(field('1.7', '/signal/amplitudeToleranceDb', 'Amplitude error', 'dB')),
  field('1.8', '/signal/sampleBits', 'Sample word', 'bits'),
  field('1.9', '/signal/sampleFullScaleLog2', 'Sample full scale'),
  field('1.10', '/signal/ringRatios', 'Ring ratios'),
];

/** The two loops number their common fields alike, so 2.4 and 3.4 are both the extra delay. */
const loopFields = (fold: 2 | 3, key: 'carrier' | 'clock'): PlanField[] => {
  const at = (position: number, path: string, label: string, unit = '') =>
    field(`${fold}.${position}`, `/${key}/${path}`, label, unit);
  return [
    at(1, 'detector', 'Detector'),
    at(2, 'order', 'Order'),
    at(3, 'updateInterval', 'Update every', 'symbols'),
    at(4, 'delay', 'Extra delay', 'updates'),
    at(5, 'method', 'BnT means'),
    at(6, 'stages/*/damping', 'Damping ζ'),
    at(7, 'stages/*/noiseBandwidth', 'BnT'),
    at(10, 'arithmetic/errorBits', 'Error word', 'bits'),
    at(11, 'arithmetic/errorFullScaleLog2', 'Error full scale'),
    at(12, 'arithmetic/gainForm', 'Gain form'),
    at(13, 'arithmetic/mantissaBits', 'Mantissa', 'bits'),
    at(14, 'arithmetic/integratorBits', 'Integrator', 'bits'),
    at(15, 'arithmetic/guardBits', 'of these, guard', 'bits'),
    at(16, 'arithmetic/rounding', 'Rounding'),
    at(17, 'arithmetic/overflow', 'Overflow'),
    at(19, 'lockDetector/averagingSymbols', 'Average over', 'symbols'),
    at(20, 'lockDetector/threshold', 'Threshold'),
    at(21, 'stages/*/until/symbols', 'Until', 'symbols'),
    at(22, 'prewarp', 'Pre-warp'),
    at(23, 'polarity', 'Polarity'),
    at(27, 'stages/*/until/lockMetric', 'Until lock metric'),
    at(28, 'arithmetic/integrator2Bits', 'Second integrator', 'bits'),
    at(29, 'arithmetic/guard2Bits', 'of these, guard', 'bits'),
    at(30, 'stages/*/naturalFrequencyHz', 'Natural frequency', 'Hz'),
    at(31, 'stages/*/name', 'Stage'),
    at(32, 'stages', 'Stages'),
    at(33, 'thirdOrder/a3', 'Form a3'),
    at(34, 'thirdOrder/b3', 'Form b3'),
  ];
};

const carrier = [
  ...loopFields(2, 'carrier'),
  field('2.8', '/carrier/nco/widthBits', 'NCO', 'bits'),
  field('2.9', '/carrier/nco/phaseBits', 'Phase to rotator', 'bits'),
  bothSigns(field('2.18', '/carrier/arithmetic/integratorLimitHz', 'Integrator limit', 'Hz')),
  field('2.24', '/carrier/nco/tableBits', 'Rotator table', 'bits'),
  field('2.25', '/carrier/nco/stepsPerSymbol', 'NCO steps per symbol'),
  field('2.26', '/carrier/nco/centreHz', 'NCO centre', 'Hz'),
];

const clock = [
  ...loopFields(3, 'clock'),
  field('3.8', '/clock/counter/widthBits', 'Counter', 'bits'),
  field('3.9', '/clock/counter/fractionBits', 'Fractional interval', 'bits'),
  bothSigns(field('3.18', '/clock/arithmetic/integratorLimitPpm', 'Integrator limit', 'ppm')),
  field('3.24', '/clock/counter/tableBits', 'Interpolator table', 'bits'),
  field('3.25', '/clock/interpolator', 'Interpolator'),
  field('3.26', '/clock/hold', 'Control word'),
];

const environment = [
  field('4.1', '/environment/carrierFrequencyHz', 'Carrier', 'Hz'),
  bothSigns(field('4.2', '/environment/carrierTolerancePpm', 'Tolerance, each end', 'ppm')),
  bothSigns(field('4.3', '/environment/dopplerHz', 'Doppler', 'Hz')),
  field('4.4', '/environment/dopplerRateHzPerS', 'Doppler rate', 'Hz/s'),
  bothSigns(field('4.5', '/environment/clockTolerancePpm', 'Clock, each end', 'ppm')),
  field('4.6', '/environment/phaseNoise', 'Oscillator phase noise', 'dBc/Hz'),
];

const limits = [
  field('5.1', '/limits/phaseJitterDeg', 'Phase jitter, most', '°'),
  field('5.2', '/limits/timingJitterSymbols', 'Timing jitter, most', 'symbols'),
  field('5.3', '/limits/phaseMarginDeg', 'Phase margin, least', '°'),
  field('5.4', '/limits/bandwidthError', 'BnT error, most'),
  field('5.5', '/limits/dampingError', 'ζ error, most'),
  field('5.6', '/limits/acquisitionSymbols', 'Acquisition, most', 'symbols'),
  field('5.7', '/limits/implementationLossDb', 'Loss, most', 'dB'),
  field('5.8', '/limits/headroomBits', 'Headroom, least', 'bits'),
];

/** Every numbered field, in the order of the sheet's folds. */
export const planFields: readonly PlanField[] = [...signal, ...carrier, ...clock, ...environment, ...limits];

const byPattern = new Map(planFields.map((entry) => [entry.pointer, entry]));

/** The field that a JSON pointer into a plan belongs to: the field itself, or the nearest one above it. */
export function fieldOf(pointer: string): PlanField | undefined {
  const parts = pointer.replace(/\/stages\/\d+/, '/stages/*').split('/');
  for (let length = parts.length; length > 1; length -= 1) {
    const found = byPattern.get(parts.slice(0, length).join('/'));
    if (found) return found;
  }
  return undefined;
}

/** Number of the field at a pointer, for sentences such as “2.18 stops short of 4.2”; the pointer itself where none is. */
export const fieldNumber = (pointer: string): string => fieldOf(pointer)?.no ?? pointer;
