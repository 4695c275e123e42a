import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/**
 * The secret that signs access tokens, made on the first start and kept where only the server's user can read it.
 * It is written beside its place and moved there whole: a start that was cut short leaves no half of one.
 */
export function signingSecret(dataDir: string): string {
  const path = join(dataDir, 'signing-secret');
  if (!existsSync(path)) {
    mkdirSync(dataDir, { recursive: true, mode: 0o700 });
    writeFileSync(`${path}.unfinished`, randomBytes(32).toString('base64url'), { mode: 0o600, flush: true });
    renameSync(`${path}.unfinished`, path);
  }
  return readFileSync(path, 'utf8').trim();
}
