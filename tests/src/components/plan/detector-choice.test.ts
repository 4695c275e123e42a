import { describe, expect, it } from 'vitest';
import { carrierDetectorsFor } from '../../../../shared/detectors/carrier';
import { rotationalSymmetry } from '../../../../shared/detectors/modulations';
import type { Modulation } from '../../../../shared/detectors/modulations';
import planSchema from '../../../../schemas/plan.schema.json';
import { detectorsWithout } from '../../../../src/components/plan/detector-choice';

const detectors: readonly string[] = planSchema.properties.carrier.properties.detector.enum;

describe('detectorsWithout', () => {
  // Independent: the engine works out every other pair, and refuses these.
  it.each(Object.keys(rotationalSymmetry) as Modulation[])('rules out for %s what the engine refuses', (modulation) => {
    const able: readonly string[] = carrierDetectorsFor(modulation);
    expect(detectorsWithout(modulation).toSorted()).toEqual(
      detectors.filter((detector) => !able.includes(detector)).toSorted(),
    );
  });
});
