import type { LoopDesign, StageDesign } from '../../../../shared/model/design';
import { numberText } from '../../../../shared/quantities/format';
import { eachStage, pointsOf, toneOf, type Figure } from './figure';

/** Fig. 9: how much wider these gains are with more delay. */
export function bandwidthFigure({ stages }: LoopDesign, delay: number): Figure {
  return {
    title: 'Noise bandwidth BnT of these gains',
    file: 'bandwidth-against-delay',
    x: { label: 'extra delay', unit: 'updates', domain: [0, reach(stages, delay)] },
    y: { label: 'BnT', domain: [0, ceiling(stages)], zero: true },
    series: stages.map(({ name, bandwidthAgainstDelay }, index) => ({
      label: name,
      tone: toneOf(index, stages.length),
      points: pointsOf(bandwidthAgainstDelay.delay, bandwidthAgainstDelay.noiseBandwidth),
    })),
    markers: stages.flatMap(({ noiseBandwidth }, index) =>
      noiseBandwidth.exact === null
        ? []
        : [{ x: delay, y: noiseBandwidth.exact, tone: toneOf(index, stages.length), hollow: true }],
    ),
    caption: captionOf(stages, delay),
  };
}

const reach = (stages: readonly StageDesign[], delay: number): number =>
  Math.max(
    8,
    Math.min(
      64,
      Math.max(1.5 * delay, ...stages.map(({ bandwidthAgainstDelay }) => bandwidthAgainstDelay.delay.at(-1) ?? 0)),
    ),
  );

/** Near its limit a loop is wider than any scale: four times what the stages have now is enough to see it rise. */
const ceiling = (stages: readonly StageDesign[]): number =>
  4 * Math.max(1e-9, ...stages.map(({ noiseBandwidth }) => noiseBandwidth.exact ?? 0));

function captionOf(stages: readonly StageDesign[], delay: number): string {
  const wider = eachStage(stages, ({ noiseBandwidth, bandwidthAgainstDelay }) => {
    const bare = bandwidthAgainstDelay.noiseBandwidth[bandwidthAgainstDelay.delay.indexOf(0)];
    if (noiseBandwidth.exact === null || !bare) return 'is unstable';
    return `is ${numberText(100 * (noiseBandwidth.exact / bare - 1), { decimals: 1 })} % wider`;
  });
  const ends = stages.filter(({ largestDelay }) => largestDelay !== null && largestDelay < 64);
  const end = ends.length
    ? ` No longer stable: ${ends.map(({ name, largestDelay }) => `${name} beyond ${largestDelay} updates`).join(', ')}.`
    : '';
  return `Than without extra delay, at delay ${delay} ${wider}.${end}`;
}
