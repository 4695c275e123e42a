import type { LoopDesign, StageDesign } from '../../../shared/model/design';
import { numberText } from '../../../shared/quantities/format';
import { frequencies, present, row } from './group-rows';
import type { GainGroup, GainRow } from './group-rows';

/** Everything that a design says of a loop's stages: asked for, reached, gains, words. */
export function gainGroups(loop: LoopDesign): GainGroup[] {
  const { stages } = loop;
  return [
    { title: 'Asked for', rows: askedRows(stages) },
    { title: 'What the loop does, delay included', rows: reachedRows(stages) },
    { title: 'Gains of the loop', rows: loopGainRows(stages) },
    { title: 'Gains, per detector unit', rows: detectorGainRows(stages, loop.detector.gain) },
    { title: 'Words', rows: wordRows(stages) },
    { title: gainControl(stages), rows: amplitudeRows(stages) },
  ].filter(({ rows }) => rows.length > 0);
}

const percent = (value: number | null): number | null => (value === null ? null : 100 * value);
const decibels = (ratio: number | null): number | null => (ratio === null ? null : 20 * Math.log10(ratio));

function askedRows(stages: readonly StageDesign[]): GainRow[] {
  return present([
    row('Noise bandwidth BnT', '', { decimals: 4 }, (stage) => stage.noiseBandwidth.wanted).of(stages),
    row('Damping ζ', '', { decimals: 4 }, (stage) => stage.damping.wanted).of(stages),
  ]);
}

function reachedRows(stages: readonly StageDesign[]): GainRow[] {
  return [
    row('Noise bandwidth BnT', '', { decimals: 6 }, (stage) => stage.noiseBandwidth.exact).of(stages),
    frequencies('Noise bandwidth Bn', 2, (stage) => stage.noiseBandwidthHz.exact).of(stages),
    ...present([row('Damping ζ', '', { decimals: 6 }, (stage) => stage.damping.exact).of(stages)]),
    ...present([frequencies('Natural frequency', 3, (stage) => stage.naturalFrequencyHz.exact).of(stages)]),
    row('Phase margin', '°', { decimals: 1 }, (stage) => stage.margins.phaseDeg).of(stages),
    row('Gain margin up', 'dB', { decimals: 1 }, (stage) => decibels(stage.margins.gainUp)).of(stages),
    ...present([
      row('Gain margin down', 'dB', { decimals: 1 }, (stage) => decibels(stage.margins.gainDown)).of(stages),
    ]),
    frequencies('3 dB bandwidth of H', 2, (stage) => stage.bandwidth3DbHz).of(stages),
    row('Peaking of H', 'dB', { decimals: 2 }, (stage) => stage.peakingDb).of(stages),
    row('Settles to 2 %', 'updates', { decimals: 0 }, (stage) => stage.settlingUpdates).of(stages),
    row('Overshoot', '%', { decimals: 1 }, (stage) => percent(stage.overshoot)).of(stages),
    row('Stable up to delay', 'updates', { decimals: 0 }, (stage) => stage.largestDelay).of(stages),
  ];
}

const scientific = { significant: 5, exponent: true };

type GainName = 'g1' | 'g2' | 'g3';

/** An integral gain that a first-order loop lacks is none, not 0. */
const gainOf = ({ gains }: StageDesign, name: GainName): number | null => gains[name] || null;

function loopGainRows(stages: readonly StageDesign[]): GainRow[] {
  return present([
    row('Proportional g1', '', scientific, (stage) => gainOf(stage, 'g1')).of(stages),
    row('Integral g2', '', scientific, (stage) => gainOf(stage, 'g2')).of(stages),
    row('Second integral g3', '', scientific, (stage) => gainOf(stage, 'g3')).of(stages),
  ]);
}

/** What one detector unit turns the oscillator by: the loop's gains over the slope of the detector. */
function detectorGainRows(stages: readonly StageDesign[], slope: number): GainRow[] {
  const over = (name: GainName) => (stage: StageDesign) => {
    const gain = gainOf(stage, name);
    return gain === null ? null : gain / slope;
  };
  return present([
    row('Proportional', '', scientific, over('g1')).of(stages),
    row('Integral', '', scientific, over('g2')).of(stages),
    row('Second integral', '', scientific, over('g3')).of(stages),
  ]);
}

function wordRows(stages: readonly StageDesign[]): GainRow[] {
  return [
    ...words('Proportional', 'proportional', stages),
    ...words('Integral', 'integral', stages),
    ...words('Second integral', 'integral2', stages),
    row('BnT from words', '', { decimals: 6 }, (stage) => stage.noiseBandwidth.effective).of(stages),
    row('Error of BnT', '%', { decimals: 3, sign: true }, (stage) => percent(stage.bandwidthError)).of(stages),
    ...present([
      row('ζ from words', '', { decimals: 6 }, (stage) => stage.damping.effective).of(stages),
      row('Error of ζ', '%', { decimals: 3, sign: true }, (stage) => percent(stage.dampingError)).of(stages),
    ]),
    row('Phase margin from words', '°', { decimals: 1 }, (stage) => stage.effectivePhaseDeg).of(stages),
  ];
}

function words(
  label: string,
  name: 'proportional' | 'integral' | 'integral2',
  stages: readonly StageDesign[],
): GainRow[] {
  const cells = stages.map((stage) => stage.words[name]).filter((word) => word !== undefined);
  return cells.length === stages.length ? [{ label, unit: '', cells }] : [];
}

const gainControl = ([stage]: readonly StageDesign[]): string =>
  `With the amplitude ${numberText(stage?.amplitude.high.amplitudeDb ?? 0)} dB low and high`;

/** The loop at both ends of the gain control's error; nothing to say where it has none. */
function amplitudeRows(stages: readonly StageDesign[]): GainRow[] {
  if (stages.every(({ amplitude }) => amplitude.high.amplitudeDb === 0)) return [];
  return present([
    row('BnT, low', '', { decimals: 6 }, ({ amplitude }) => amplitude.low.noiseBandwidth).of(stages),
    row('BnT, high', '', { decimals: 6 }, ({ amplitude }) => amplitude.high.noiseBandwidth).of(stages),
    row('Damping ζ, low', '', { decimals: 4 }, ({ amplitude }) => amplitude.low.damping).of(stages),
    row('Damping ζ, high', '', { decimals: 4 }, ({ amplitude }) => amplitude.high.damping).of(stages),
    row('Phase margin, low', '°', { decimals: 1 }, ({ amplitude }) => amplitude.low.phaseDeg).of(stages),
    row('Phase margin, high', '°', { decimals: 1 }, ({ amplitude }) => amplitude.high.phaseDeg).of(stages),
  ]);
}
