import { Ajv2020 } from 'ajv/dist/2020';
import { mount } from '@vue/test-utils';
import { defineComponent, h } from 'vue';
import { afterEach, describe, expect, it, vi } from 'vitest';
import designSchema from '../../../schemas/design.schema.json';
import planSchema from '../../../schemas/plan.schema.json';
import wordsSchema from '../../../schemas/words.schema.json';
import { corvidC2Target } from '../../../seeds/corvid-c2-map';
import { registerValues } from '../../../shared/registers/binding';
import { quantitiesOf } from '../../../shared/registers/quantities';
import type { Design } from '../../../shared/model/design';
import { completeDesign } from '../../../src/api/older-designs';
import { getRevision } from '../../../src/api/revisions';
import { compareRows } from '../../../src/components/plan/compare-rows';
import PlanMeaning from '../../../src/components/plan/PlanMeaning.vue';
import { provideDraft } from '../../../src/composables/use-draft';
import { stubApi } from '../support/api';
import { design, plan } from '../support/plan';
// What the engine of 2026-12-01, before budgets had all terms, gave for the worked example; its lists are thinned out.
import older from '../support/older-design.json';

const saved = older as unknown as Design;
const schemas = new Ajv2020({ strict: false, allErrors: true });
schemas.addSchema([planSchema, wordsSchema]);
const validate = schemas.compile(designSchema);

/** What the schema misses in a design. */
const missing = (of: Design): string[] => {
  validate(of);
  return (validate.errors ?? []).map(({ instancePath, message }) => `${instancePath} ${message}`);
};

afterEach(() => {
  vi.unstubAllGlobals();
  document.body.innerHTML = '';
});

describe('completeDesign', () => {
  it('gives an older design every key that a design has now', () => {
    expect(missing(saved)).toContain(" must have required property 'solutions'");
    expect(missing(completeDesign(saved))).toEqual([]);
  });

  it('keeps every number that was saved', () => {
    expect(completeDesign(saved)).toMatchObject(saved);
  });

  it('makes no number up: what is new is null or empty', () => {
    const { carrier, clock, solutions, interaction } = completeDesign(saved);
    expect([solutions, interaction, clock?.interpolator]).toEqual([[], null, null]);
    expect(carrier?.budget).toMatchObject({ boundRatio: null, squaringLoss: null, slip: null, nco: null });
    expect(carrier?.budget?.stages[0]).toMatchObject({ selfNoise: null, wordQuantisation: null });
    expect(carrier?.acquisition).toMatchObject({ pullOutHz: null, lockDetector: null, stages: [] });
    expect(carrier?.detector).toMatchObject({ spectrumAtZero: null, nulls: [] });
    expect(carrier?.stages[1]).toMatchObject({ frequencyStep: null, rootLocus: { poles: [] } });
  });

  // The defaults of 5.1 and 5.2: 3 degrees rms and 0.01 symbols.
  it('takes the limit of a budget from the plan', () => {
    const limitOf = (unit: 'deg' | 'symbols') => {
      const budget = { ...saved.carrier!.budget!, unit };
      return completeDesign({ ...saved, carrier: { ...saved.carrier!, budget } }).carrier?.budget?.limit;
    };
    expect([limitOf('deg'), limitOf('symbols')]).toEqual([3, 0.01]);
  });

  it('shows the loop itself where the ends of the amplitude are not known', () => {
    const stage = completeDesign(saved).carrier!.stages[0]!;
    expect(stage.amplitude.low).toMatchObject({ amplitudeDb: 0, phaseDeg: stage.margins.phaseDeg });
  });

  it('leaves a design of this engine as it is', () => {
    expect(completeDesign(design())).toEqual(design());
  });

  it('takes a design of one loop', () => {
    const { clock: _gone, ...carrierAlone } = saved;
    expect(completeDesign(carrierAlone)).not.toHaveProperty('clock');
  });
});

describe('a revision of an older engine', () => {
  it('is read whole', async () => {
    stubApi(() => ({ body: { id: 101, number: 14, design: older, description: plan() } }));
    expect(missing((await getRevision(101)).design)).toEqual([]);
  });

  it.each(['carrier', 'clock'] as const)('is shown on the sheet: %s', (loop) => {
    const sheet = defineComponent(() => {
      provideDraft().open(plan(), plan(), { basedOn: 14, typed: {} });
      const props = { design: completeDesign(saved), stale: undefined, waiting: false, modelValue: loop };
      return () => h(PlanMeaning, props);
    });
    const text = mount(sheet, { global: { stubs: { RouterLink: true } } }).text();
    expect(text).toContain('Gains and words');
    expect(text).not.toMatch(/NaN|undefined|Infinity/);
  });

  it('is compared with a draft of this engine, and gives its words', () => {
    const before = { name: 'r14', plan: saved.plan, design: completeDesign(saved) };
    const rows = compareRows(before, { name: 'draft', plan: plan(), design: design() }, corvidC2Target.registerMap);
    expect(JSON.stringify(rows)).not.toMatch(/NaN|undefined/);
    const quantities = quantitiesOf({ plan: saved.plan, design: before.design });
    expect(registerValues(corvidC2Target.registerMap, quantities).length).toBeGreaterThan(0);
  });
});
