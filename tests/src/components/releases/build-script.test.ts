import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ReleaseSummary } from '../../../../src/api/releases';
import { buildScript } from '../../../../src/components/releases/build-script';

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
const header = '#define CVD_DIGEST 1\n';
const files = [{ name: 'dl_qpsk.config.h', bytes: header.length, sha256: sha256(header) }];
const manifest = `${JSON.stringify({ files }, null, 2)}\n`;
const release = { target: { slug: 'corvid-c2' }, version: '2.4.0' } as ReleaseSummary;

/** Runs the lines with a curl and a jq that stand in for the network and for a package that may be missing. */
function run(script: string, served: Record<string, string>): string {
  const server = join(folder, 'served');
  for (const [name, text] of Object.entries(served)) writeFileSync(join(server, name), text);
  const work = mkdtempSync(join(folder, 'work-'));
  const env = { PATH: `${join(folder, 'bin')}:${process.env.PATH}`, SERVED: server, KEEPSTEP_TOKEN: 'token' };
  return execFileSync('sh', ['-c', script], { cwd: work, env, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] });
}

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'build-script-'));
  for (const each of ['bin', 'served']) mkdirSync(join(folder, each));
  const curl = '#!/bin/sh\nfor last; do :; done\ncp "$SERVED/${last##*/}" .\necho "$last"\n';
  const jq = `#!/bin/sh\nexec ${process.execPath} -e 'const m = JSON.parse(require("fs").readFileSync(process.argv.at(-1), "utf8"));
for (const f of m.files) console.log(f.sha256 + "  " + f.name)' -- "$@"\n`;
  for (const [name, text] of Object.entries({ curl, jq }))
    writeFileSync(join(folder, 'bin', name), text, { mode: 0o755 });
});
afterAll(() => rmSync(folder, { recursive: true }));

describe('buildScript', () => {
  const entry = { name: 'manifest.json', bytes: manifest.length, sha256: sha256(manifest) };
  const script = buildScript('https://keepstep.example/api/v1', release, entry);

  it('fetches every file of the manifest by target and version and checks each', () => {
    const output = run(script, { 'manifest.json': manifest, 'dl_qpsk.config.h': header });
    expect(output).toContain('https://keepstep.example/api/v1/targets/corvid-c2/releases/2.4.0/files/manifest.json');
    expect(output).toContain('dl_qpsk.config.h: OK');
  });

  it('stops at a manifest that differs', () => {
    expect(() => run(script, { 'manifest.json': `${manifest} `, 'dl_qpsk.config.h': header })).toThrow();
  });

  it('stops at a file that differs', () => {
    expect(() => run(script, { 'manifest.json': manifest, 'dl_qpsk.config.h': `${header} ` })).toThrow();
  });
});
