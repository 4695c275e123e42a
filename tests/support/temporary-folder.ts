import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';

const made: string[] = [];

afterAll(() => {
  for (const folder of made.splice(0)) rmSync(folder, { recursive: true, force: true });
});

/** A new empty folder that goes when the tests of the importing file are over. */
export function temporaryFolder(name: string): string {
  const folder = mkdtempSync(join(tmpdir(), `keepstep-${name}-`));
  made.push(folder);
  return folder;
}
