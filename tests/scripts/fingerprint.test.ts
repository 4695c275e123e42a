import { createHash } from 'node:crypto';
import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { fingerprint } from '../../scripts/support/fingerprint.mjs';

describe('fingerprint', () => {
  let root: string;
  beforeEach(() => {
    root = mkdtempSync(join(tmpdir(), 'keepstep-fingerprint-'));
    mkdirSync(join(root, 'src/deep'), { recursive: true });
    writeFileSync(join(root, 'src/deep/a.ts'), 'a');
    writeFileSync(join(root, 'lock'), 'l');
  });
  afterEach(() => rmSync(root, { recursive: true }));
  const now = () => fingerprint(root, ['src', 'lock', 'absent']);

  it('hashes each name, length and content in order', () => {
    const expected = createHash('sha256')
      .update('src/deep/a.ts\0' + '1\0a' + 'lock\0' + '1\0l')
      .digest('hex');
    expect(now()).toBe(expected);
  });

  it.each([
    ['a content changes', () => writeFileSync(join(root, 'src/deep/a.ts'), 'b')],
    ['a file is added', () => writeFileSync(join(root, 'src/b.ts'), '')],
    ['a file is renamed', () => renameSync(join(root, 'lock'), join(root, 'absent'))],
    ['content moves to the next file', () => writeFileSync(join(root, 'src/deep/a.ts'), 'alock')],
  ])('changes when %s', (_what, change) => {
    const before = now();
    change();
    expect(now()).not.toBe(before);
  });

  it('does not see what lies beside the named paths', () => {
    const before = now();
    writeFileSync(join(root, 'other'), 'x');
    expect(now()).toBe(before);
  });
});
