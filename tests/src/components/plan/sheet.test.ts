import { describe, expect, it } from 'vitest';
import { ref, shallowRef, computed } from 'vue';
import { bothEndsText, foldSummary } from '../../../../src/components/plan/fold-summary';
import { compareRows } from '../../../../src/components/plan/compare-rows';
import { registerDrawings } from '../../../../src/components/plan/register-drawings';
import { createReason } from '../../../../src/components/plan/save-reason';
import { sheetStateText } from '../../../../src/components/plan/sheet-state';
import {
  staleReason,
  verdictAside,
  verdictSentence,
  type SheetState,
} from '../../../../src/components/plan/sheet-verdict';
import { examplePlan } from '../../../../src/components/plans/example-plan';
import { corvidC2Target } from '../../../../seeds/corvid-c2-map';
import { withValue } from '../../../../shared/plan/pointer';
import { design, plan } from '../../support/plan';

const sheet = (over: Partial<SheetState> = {}): SheetState => ({
  ...{ design: design(), freshness: 'fresh', wrong: [], subject: 'r14' },
  ...over,
});

describe('the verdict', () => {
  it('counts wrong fields first', () => {
    const state = sheet({ wrong: ['/signal/rollOff', '/carrier/delay'], freshness: 'stale' });
    expect(verdictSentence(state)).toBe('2 fields are wrong. The first is');
    expect(staleReason(state)).toBe('1.4 must be mended first.');
  });

  it('asks for what is missing on an empty sheet', () => {
    expect(verdictSentence(sheet({ design: null, freshness: 'none' }))).toContain('symbol rate (1.2)');
  });

  it('says that a failing finding keeps a revision from being frozen', () => {
    const narrow = withValue(examplePlan('corvid-c2'), '/carrier/arithmetic', { integratorLimitHz: 70e3 });
    const sentence = verdictSentence(sheet({ design: design(narrow), subject: 'This draft' }));
    expect(sentence).toBe('This draft can be saved but not frozen: the integrator stops short of the carrier.');
  });

  it('ends with jitter and margin of the last stage', () => {
    expect(verdictAside(design())).toMatch(/^track 1\.9\d° jitter, 6\d\.\d° margin$/);
  });
});

describe('foldSummary', () => {
  it('says a shut fold in one line', () => {
    expect(foldSummary.signal(plan())).toBe('QPSK · 27.5 MBd · α 0.35');
    expect(foldSummary.loop(plan(), 'carrier')).toBe('Sign · BnT 0.01, 0.004');
    expect(foldSummary.loop({}, 'clock')).toBe('none');
    expect(foldSummary.environment(plan())).toBe('1.55 GHz · ±77.5 kHz · ±20 ppm clock');
  });

  // 25 ppm of 1.55 GHz are 38.75 kHz; both ends make 77.5 kHz.
  it('adds both ends', () => {
    expect(bothEndsText(plan())).toBe('both ends: ±50 ppm = ±77.5 kHz');
    expect(bothEndsText({})).toBeUndefined();
  });
});

describe('compareRows', () => {
  const after = withValue(examplePlan('corvid-c2'), '/carrier/arithmetic', { integratorLimitHz: 70e3 });
  const rows = compareRows(
    { name: 'r14', plan: plan(), design: design() },
    { name: 'draft', plan: after, design: design(after) },
    corvidC2Target.registerMap,
  );

  it('lists what it means, what was typed and the words, and nothing that is alike', () => {
    expect(rows.filter(({ group }) => group === 'What was typed')).toEqual([
      { group: 'What was typed', number: '2.18', label: 'Integrator limit', before: 'none', after: '±70 kHz' },
    ]);
    expect(rows.find(({ label }) => label === 'Largest carrier offset held')?.after).toBe('±70 kHz');
    expect(rows.filter(({ group }) => group === 'Words').every(({ label }) => label.startsWith('CAR_LIMIT'))).toBe(
      true,
    );
  });
});

describe('registerDrawings', () => {
  const after = withValue(examplePlan('corvid-c2'), '/carrier/delay', 5);
  const drawings = registerDrawings({
    ...{ map: corvidC2Target.registerMap, baseAddress: corvidC2Target.baseAddress },
    ...{ design: design(after), before: design() },
  });

  // Delay stands in bits 30 to 24 of CAR_CTRL: 3 in r14, 5 now; base 0x40010000 + 0x4000.
  it('shows the word, what it was, and outlines the field that differs', () => {
    const control = drawings.find(({ name }) => name === 'CAR_CTRL')!;
    expect(control.address).toBe('0x40014000');
    expect([control.value.slice(0, 4), control.was?.slice(0, 4)]).toEqual(['0x05', '0x03']);
    expect(control.fields.filter(({ selected }) => selected)).toEqual([
      { name: 'delay', high: 30, low: 24, value: '5', selected: true },
    ]);
  });

  it('marks the gain words of the stage in use', () => {
    expect(drawings.filter(({ gains }) => gains).map(({ name }) => name)).toEqual(['CAR_GAIN_TRK', 'CAR_SHIFT_TRK']);
  });
});

describe('state and reasons', () => {
  const draft = (edits: number, base?: string) => ({
    changes: computed(() => Array.from({ length: edits }, () => ({ pointer: '', before: 0, after: 1 }))),
    baseName: computed(() => base),
    typed: shallowRef({}),
    locked: ref<string>(),
  });

  it('says what the sheet shows', () => {
    const stored = { stored: true, kept: true };
    expect(sheetStateText(draft(1, 'r14'), stored)).toBe('draft on r14, 1 edit');
    expect(sheetStateText(draft(0, 'r14'), stored)).toBe('r14');
    expect(sheetStateText(draft(2, 'r14'), { stored: true, kept: false })).toBe('draft on r14, 2 edits, not kept yet');
    expect(sheetStateText(draft(0), { stored: false, kept: true })).toBe('new, not stored');
  });

  it('says what a new plan still needs', () => {
    const reason = (typed: ReturnType<typeof plan>) =>
      createReason({ plan: shallowRef(typed), locked: ref<string>() }, sheet());
    expect(reason({})).toBe('needs a name');
    expect(reason({ name: 'Uplink' })).toBe('needs a target');
    expect(reason({ name: 'Uplink', target: 'corvid-c2' })).toBe('needs 1.2, the symbol rate');
    expect(reason(plan())).toBeUndefined();
  });
});
