import { requiredOffsetHz } from '../../../shared/plan/required-offset';
import { settled } from '../../../shared/plan/changes';
import { valueAt } from '../../../shared/plan/pointer';
import { quantityText, numberText } from '../../../shared/quantities/format';
import type { DraftPlan } from '../../api/plans';
import { fieldText } from './field-text';

const joined = (parts: (string | false | undefined)[]): string => parts.filter(Boolean).join(' · ');
const read = (plan: DraftPlan, pointer: string): string => fieldText(pointer, settled(plan, pointer));

/** One line for each shut fold, so that a sheet reads without opening any. */
export const foldSummary = {
  signal: (plan: DraftPlan): string =>
    joined([
      read(plan, '/signal/modulation'),
      read(plan, '/signal/symbolRateBd'),
      `α ${read(plan, '/signal/rollOff')}`,
    ]),

  loop(plan: DraftPlan, loop: 'carrier' | 'clock'): string {
    if (!plan[loop]) return 'none';
    const stages = (valueAt(plan, `/${loop}/stages`) ?? []) as unknown[];
    const bandwidths = stages.flatMap((stage) => valueAt(stage, '/noiseBandwidth') ?? []);
    return joined([
      read(plan, `/${loop}/detector`),
      loop === 'clock' && read(plan, '/clock/interpolator').toLowerCase(),
      bandwidths.length > 0 && `BnT ${bandwidths.map((value) => numberText(value as number)).join(', ')}`,
    ]);
  },

  environment(plan: DraftPlan): string {
    const carrier = settled(plan, '/environment/carrierFrequencyHz');
    const clock = settled(plan, '/environment/clockTolerancePpm') as number;
    return joined([
      typeof carrier === 'number' && quantityText(carrier, { unit: 'Hz' }),
      `±${quantityText(offsetHz(plan), { unit: 'Hz', significant: 4 })}`,
      `±${numberText(clock)} ppm clock`,
    ]);
  },

  limits: (plan: DraftPlan): string =>
    joined([
      `jitter ${read(plan, '/limits/phaseJitterDeg').replace(' rms', '')}`,
      `margin ${read(plan, '/limits/phaseMarginDeg')}`,
      `loss ${read(plan, '/limits/implementationLossDb')}`,
    ]),
};

const offsetHz = (plan: DraftPlan): number => requiredOffsetHz(plan.environment ?? {});

/** What field 4.2 comes to: “both ends: ±50 ppm = ±77.5 kHz”. */
export function bothEndsText(plan: DraftPlan): string | undefined {
  const { carrierTolerancePpm = 0, carrierFrequencyHz } = plan.environment ?? {};
  if (carrierTolerancePpm === 0) return undefined;
  const sum = `both ends: ±${numberText(2 * carrierTolerancePpm)} ppm`;
  if (carrierFrequencyHz === undefined) return sum;
  const hz = requiredOffsetHz({ carrierFrequencyHz, carrierTolerancePpm });
  return `${sum} = ±${quantityText(hz, { unit: 'Hz', significant: 4 })}`;
}
