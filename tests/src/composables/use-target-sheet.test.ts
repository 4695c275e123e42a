import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { corvidC2Target } from '../../../seeds/corvid-c2-map';
import type { TargetBody } from '../../../shared/model/target';
import type { TargetDetail } from '../../../src/api/targets';
import * as edits from '../../../src/components/target/map-edits';
import { useTargetSheet } from '../../../src/composables/use-target-sheet';

/** A server that keeps one target and refuses to write over a newer version. */
function serverWith(target: TargetDetail) {
  const state = { target };
  const json = (status: number, body: object) => Promise.resolve(new Response(JSON.stringify(body), { status }));
  const answer = (_: string, { method, headers, body }: RequestInit): Promise<Response> => {
    if (method === 'GET') return json(200, state.target);
    const wanted = (headers as Record<string, string>)['if-match'];
    if (wanted !== `"${state.target.version}"`)
      return json(412, { type: '/problems/stale', title: 'Stale', status: 412 });
    state.target = {
      ...state.target,
      ...(JSON.parse(body as string) as TargetBody),
      version: state.target.version + 1,
    };
    state.target.mapNumber += 1;
    return json(200, state.target);
  };
  vi.stubGlobal('fetch', answer);
  return state;
}

const stored: TargetDetail = {
  ...corvidC2Target,
  mapNumber: 6,
  planCount: 4,
  newestRelease: { version: '2.3.0', state: 'frozen' },
  version: 9,
};
const renamed = (target: { registerMap: TargetBody['registerMap'] }, index: number, name: string) =>
  edits.withRegister(target.registerMap, index, { name });

beforeEach(() => localStorage.clear());
afterEach(() => vi.unstubAllGlobals());

async function opened() {
  const sheet = useTargetSheet('corvid-c2');
  await sheet.load();
  return sheet;
}

describe('useTargetSheet', () => {
  it('saves the edits as the next map', async () => {
    const server = serverWith(stored);
    const sheet = await opened();
    expect(sheet.edited.value).toBe(false);
    sheet.editMap(edits.withRegister(stored.registerMap, 0, { note: 'Seen' }));
    expect(sheet.changes.value).toEqual([{ name: 'CAR_CTRL', kind: 'changed' }]);
    expect(await sheet.save()).toBe(true);
    expect(server.target.registerMap.registers[0]?.note).toBe('Seen');
    expect([sheet.edited.value, sheet.base.value?.mapNumber]).toEqual([false, 7]);
  });

  it('keeps unsaved edits for the next visit', async () => {
    serverWith(stored);
    const sheet = await opened();
    sheet.editMap(renamed(stored, 1, 'FREQ'));
    await vi.waitFor(() => expect(localStorage.length).toBe(1));
    const again = await opened();
    expect(again.body.value?.registerMap.registers[1]?.name).toBe('FREQ');
    expect([again.edited.value, again.newer.value]).toEqual([true, undefined]);
  });

  it('is refused by a newer state, loses nothing, and carries the edits over', async () => {
    const server = serverWith(stored);
    const sheet = await opened();
    sheet.editMap(renamed(stored, 1, 'MINE'));
    server.target = { ...stored, version: 10, mapNumber: 7, registerMap: renamed(stored, 0, 'THEIRS') };
    expect(await sheet.save()).toBe(false);
    expect(sheet.newer.value?.mapNumber).toBe(7);
    expect(sheet.body.value?.registerMap.registers[1]?.name).toBe('MINE');
    sheet.rebase();
    const names = sheet.body.value?.registerMap.registers.map(({ name }) => name);
    expect(names).toContain('MINE');
    expect(names).toContain('THEIRS');
    expect(names).not.toContain('CAR_FCW');
    expect(await sheet.save()).toBe(true);
    expect(server.target.version).toBe(11);
  });

  it('says at the next visit that somebody else has saved meanwhile', async () => {
    const server = serverWith(stored);
    const sheet = await opened();
    sheet.editMap(renamed(stored, 1, 'MINE'));
    await vi.waitFor(() => expect(localStorage.length).toBe(1));
    server.target = { ...stored, version: 10, mapNumber: 7 };
    const again = await opened();
    expect(again.newer.value?.version).toBe(10);
    again.takeTheirs();
    expect([again.edited.value, again.base.value?.version]).toEqual([false, 10]);
  });

  it('takes an act back as a whole', async () => {
    serverWith(stored);
    const sheet = await opened();
    sheet.editMap(edits.withoutRegister(stored.registerMap, 3), 'CAR_SHIFT_ACQ is out of the map.');
    expect(sheet.undo.value?.said).toBe('CAR_SHIFT_ACQ is out of the map.');
    sheet.takeBack();
    expect([sheet.edited.value, sheet.undo.value]).toEqual([false, undefined]);
  });
});
