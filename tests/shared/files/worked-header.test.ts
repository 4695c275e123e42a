import { describe, expect, it } from 'vitest';
import { corvidC2Target } from '../../../seeds/corvid-c2-map';
import { workOut } from '../../../shared/design';
import { configHeader } from '../../../shared/files/c-header';
import { bindingFindings } from '../../../shared/registers/binding';
import { quantitiesOf } from '../../../shared/registers/quantities';
import { samplePlan } from '../sample-plan';
import { complaints, including, languages } from './compile';
import { input, target } from './fixture';

describe('the header of a plan that was worked out', () => {
  const design = workOut(samplePlan());
  const quantities = quantitiesOf({ plan: design.plan, design });

  it.each(languages)('compiles as %s without a warning', (language) => {
    const header = configHeader(input({ plan: design.plan, design }));
    expect(complaints({ 'config.h': header }, including('config.h'), language)).toBe('');
  });

  it('fits the registers of the demo board', () => {
    expect(bindingFindings(corvidC2Target.registerMap, quantities)).toEqual([]);
    expect(target.registerMap).toBe(corvidC2Target.registerMap);
  });

  // A mantissa of 12 bits lies in [1024, 2047]: to the nearest one the error is at most half a part in 1024.
  it('rounds every gain by at most half a mantissa step', () => {
    const errors = quantities
      .filter(({ path }) => /\.(proportional|integral)\.mantissa$/.test(path))
      .map(({ meaning }) => Number(/, ([+−]?[\d.e−]+) %/.exec(meaning)?.[1]?.replaceAll('−', '-')));
    expect(errors).toHaveLength(8);
    for (const error of errors) expect(Math.abs(error)).toBeLessThanOrEqual(100 / 2048);
  });
});
