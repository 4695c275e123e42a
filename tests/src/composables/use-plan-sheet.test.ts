import { flushPromises, mount, type VueWrapper } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createMemoryHistory, createRouter } from 'vue-router';
import { withValue } from '../../../shared/plan/pointer';
import type { PlanSheet } from '../../../src/api/plans';
import { createDraft, type DraftSession } from '../../../src/composables/use-draft';
import { usePlanSheet, type PlanSheetSession } from '../../../src/composables/use-plan-sheet';
import { design, plan } from '../support/plan';

let draft: DraftSession;
let session: PlanSheetSession;
let wrapper: VueWrapper | undefined;
let answers: Record<string, () => Response>;
const asked = vi.fn();

const json = (body: unknown, status = 200) => new Response(JSON.stringify(body), { status });
const revision = (number: number) => ({ id: 100 + number, number, by: { id: 1, name: 'Ines Maro' }, note: '' });
const worked = design();
const old = withValue(plan(), '/carrier/delay', 1);
const stored = (over: Partial<PlanSheet> = {}) => ({
  ...{ id: 7, name: 'Transponder 17', version: 3, description: plan(), head: revision(2), draft: null },
  ...over,
});

async function open(id: number | undefined, path = '/') {
  const page = { render: () => null };
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/', name: 'new-plan', component: page },
      { path: '/plans/:id', name: 'plan', component: page },
    ],
  });
  await router.push(path);
  draft = createDraft();
  const setup = () => {
    session = usePlanSheet(() => id, draft);
    return () => null;
  };
  wrapper = mount({ setup }, { global: { plugins: [router] } });
  await flushPromises();
  return router;
}

beforeEach(() => {
  sessionStorage.clear();
  asked.mockReset();
  answers = {
    'GET /plans/7': () => json(stored()),
    'GET /plans/7/revisions': () => json({ items: [revision(2), revision(1)], next: null }),
    'GET /revisions/101': () => json({ ...revision(1), description: old, design: worked }),
    'GET /revisions/102': () => json({ ...revision(2), description: plan(), design: worked }),
  };
  vi.stubGlobal('fetch', (path: string, init: RequestInit) => {
    const name = `${init.method} ${path.replace('/api/v1', '').replace(/\?.*/, '')}`;
    asked(name, init);
    return Promise.resolve(answers[name]?.() ?? new Response(null, { status: 204 }));
  });
});
afterEach(() => {
  wrapper?.unmount();
  vi.unstubAllGlobals();
});

describe('usePlanSheet', () => {
  it('opens the last revision, ready for edits on it', async () => {
    await open(7);
    expect([draft.baseName.value, draft.changes.value.length, session.opened.value]).toEqual(['r2', 0, 1]);
    expect(session.divergence.value).toBeNull();
  });

  it('brings a draft back, wrong texts too', async () => {
    const edits = { basedOn: 2, plan: withValue(plan(), '/carrier/delay', 9), typed: { '/signal/rollOff': 'x' } };
    answers['GET /plans/7'] = () => json(stored({ draft: { ...edits, updatedAt: '' } }));
    await open(7);
    expect(draft.changes.value.map(({ after }) => after)).toEqual([9]);
    expect(draft.typed.value).toEqual(edits.typed);
  });

  it('shows both sides when a draft starts from an older revision', async () => {
    const edits = { basedOn: 1, plan: withValue(old, '/signal/rollOff', 0.2), typed: {} };
    answers['GET /plans/7'] = () => json(stored({ draft: { ...edits, updatedAt: '' } }));
    await open(7);
    expect(session.divergence.value).toMatchObject({ head: { number: 2 }, version: 3, theirs: plan(), base: old });
  });

  it('saves over exactly the version that was read', async () => {
    answers['POST /plans/7/revisions'] = () => json(revision(3), 201);
    await open(7);
    draft.set('/carrier/delay', 5);
    await session.save('Delay after timing closure');
    const save = asked.mock.calls.find(([name]) => name === 'POST /plans/7/revisions')![1] as RequestInit;
    expect((save.headers as Record<string, string>)['if-match']).toBe('"3"');
    expect(JSON.parse(save.body as string)).toMatchObject({
      note: 'Delay after timing closure',
      plan: { carrier: { delay: 5 } },
    });
  });

  it('keeps everything typed when somebody else was faster, and goes on from their revision', async () => {
    const theirs = withValue(plan(), '/signal/rollOff', 0.5);
    const current = { version: 4, head: revision(3), description: theirs };
    answers['POST /plans/7/revisions'] = () => json({ title: 'Somebody saved first.', current }, 412);
    await open(7);
    draft.set('/carrier/delay', 5);
    await session.save('Mine');
    expect(draft.value('/carrier/delay')).toBe(5);
    expect(session.divergence.value).toMatchObject({ head: { number: 3 }, version: 4, theirs, base: plan() });

    answers['GET /revisions/103'] = () => json({ ...revision(3), description: theirs, design: worked });
    await session.rebase(withValue(theirs, '/carrier/delay', 5));
    expect(draft.changes.value.map(({ pointer }) => pointer)).toEqual(['/carrier/delay']);
    expect([draft.baseName.value, session.sheet.value?.version, session.divergence.value]).toEqual(['r3', 4, null]);
  });

  it('knows a plan that is not there', async () => {
    answers['GET /plans/7'] = () => json({ title: 'There is no plan 7.' }, 404);
    await open(7);
    expect(session.missing.value).toBe(true);
  });

  it('begins a new plan with the defaults of the schema, and brings it back after a reload', async () => {
    await open(undefined);
    expect(draft.value('/signal/rollOff')).toBe(0.35);
    draft.set('/name', 'Uplink 4');
    await flushPromises();
    wrapper!.unmount();
    await open(undefined);
    expect([draft.value('/name'), session.restored.value]).toEqual(['Uplink 4', true]);
  });

  it('begins with a copy when one is asked for', async () => {
    await open(undefined, '/?copy=7');
    expect(draft.value('/name')).toBe('Transponder 17, QPSK 27.5, copy');
  });

  it('leads to the sheet of a plan once it is stored', async () => {
    answers['POST /plans'] = () => json({ id: 12 }, 201);
    const router = await open(undefined);
    await session.create();
    expect(router.currentRoute.value.path).toBe('/plans/12');
  });
});
