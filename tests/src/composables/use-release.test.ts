import { afterEach, describe, expect, it, vi } from 'vitest';
import { putEntry } from '../../../src/api/releases';
import { useRelease } from '../../../src/composables/use-release';
import { stubApi } from '../support/api';
import { release } from '../support/release';

describe('useRelease', () => {
  afterEach(() => void vi.unstubAllGlobals());

  it('sends the version that was read, then reads again', async () => {
    const calls = stubApi(() => ({ body: release(), etag: '"4"' }));
    const sheet = useRelease(2);
    await sheet.load();
    expect(await sheet.change((current) => putEntry(current, 'dl_qpsk', 15))).toBe(true);
    expect(calls.map(({ method, path }) => `${method} ${path}`)).toEqual([
      'GET /releases/2',
      'PUT /releases/2/entries/dl_qpsk',
      'GET /releases/2',
    ]);
    expect(calls[1]).toMatchObject({ ifMatch: '"4"', body: { revisionId: 15 } });
  });

  it('keeps the refusal on the page and shows what somebody else has made of the release', async () => {
    let theirs = release();
    stubApi(({ method }) =>
      method === 'GET'
        ? { body: theirs, etag: '"5"' }
        : { status: 412, body: { type: '/problems/stale', title: 'Somebody was faster.', status: 412, faults: [] } },
    );
    const sheet = useRelease(2);
    await sheet.load();
    theirs = release({ entries: [] });
    expect(await sheet.change((current) => putEntry(current, 'dl_qpsk', 15))).toBe(false);
    expect(sheet.overtaken.value).toBe(true);
    expect(sheet.error.value?.title).toBe('Somebody was faster.');
    expect(sheet.release.value?.entries).toEqual([]);
  });

  it('does not read again after a refusal that is its own fault', async () => {
    const calls = stubApi(({ method }) => ({ status: method === 'GET' ? 200 : 422, body: release() }));
    const sheet = useRelease(2);
    await sheet.load();
    await sheet.change((current) => putEntry(current, 'dl_qpsk', 15));
    expect(calls.filter(({ method }) => method === 'GET')).toHaveLength(1);
    expect(sheet.overtaken.value).toBe(false);
  });
});
