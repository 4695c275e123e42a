import { describe, expect, it } from 'vitest';
import { withValue } from '../../../shared/plan/pointer';
import { createDraft, worksOut } from '../../../src/composables/use-draft';
import { plan } from '../support/plan';

function opened() {
  const draft = createDraft();
  draft.open(plan(), plan(), { basedOn: 14, typed: {} });
  return draft;
}

describe('createDraft', () => {
  it('knows what is edited and what it was', () => {
    const draft = opened();
    draft.set('/carrier/delay', 5);
    expect(draft.edited('/carrier/delay')).toBe(true);
    expect([draft.value('/carrier/delay'), draft.was('/carrier/delay')]).toEqual([5, 3]);
    expect(draft.baseName.value).toBe('r14');
    draft.restore('/carrier/delay');
    expect(draft.changes.value).toEqual([]);
  });

  it('shows the default of a key that the plan leaves out', () => {
    expect(opened().value('/signal/amplitude')).toBe(1);
  });

  it('keeps the text of a wrong field until it can be read', () => {
    const draft = opened();
    draft.setText('/signal/rollOff', 'three', '“three” is not a number.');
    expect(draft.typed.value).toEqual({ '/signal/rollOff': 'three' });
    expect(draft.fault('/signal/rollOff')).toBe('“three” is not a number.');
    draft.setText('/signal/rollOff', '0.3', undefined);
    expect([draft.typed.value, draft.fault('/signal/rollOff')]).toEqual([{}, undefined]);
  });

  it('says the server’s fault at its field and at what it lies in, as a sentence', () => {
    const draft = opened();
    draft.faults.value = [{ pointer: '/environment/phaseNoise/1/0', detail: 'offsets must rise' }];
    expect(draft.fault('/environment/phaseNoise')).toBe('Offsets must rise.');
    expect(draft.fault('/environment/dopplerHz')).toBeUndefined();
  });

  it('takes back an act and nothing that was typed after it', () => {
    const draft = opened();
    draft.act('Set 2.4 to 2', (before) => withValue(before, '/carrier/delay', 2));
    draft.set('/signal/rollOff', 0.2);
    draft.takeBack();
    expect([draft.value('/carrier/delay'), draft.value('/signal/rollOff')]).toEqual([3, 0.2]);
    expect(draft.undo.value).toBeNull();
  });

  it('drops unread text below a pointer and has the form show its values anew', () => {
    const draft = opened();
    draft.setText('/carrier/stages/0/noiseBandwidth', 'x', 'no number');
    draft.setText('/signal/rollOff', 'y', 'no number');
    draft.forget('/carrier');
    expect(Object.keys(draft.misread.value)).toEqual(['/signal/rollOff']);
    expect(draft.texts.value).toBe(1);
  });
});

describe('worksOut', () => {
  it('wants a symbol rate and a loop', () => {
    expect(worksOut(plan())).toBe(true);
    expect(worksOut(withValue(plan(), '/signal/symbolRateBd', undefined))).toBe(false);
    expect(worksOut({ signal: { symbolRateBd: 1e6 } })).toBe(false);
  });
});
