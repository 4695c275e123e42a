import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';

/*
 * The characters the font files hold, by their published ranges (unicode.json of @fontsource/noto-sans 5.3.0, "latin"
 * and "greek"), less the arrows and signs that the files lack: U+2191, U+2193, U+2215. Anything else falls back to a
 * face that does not stand on the same grid.
 */
const held =
  /^[\t\n\r\u0020-\u007e\u00a0-\u00ff\u0131\u0152\u0153\u02c6\u02da\u02dc\u0370-\u03ff\u2002-\u2064\u20ac\u2122\u2212]*$/u;

function sources(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    return entry.isDirectory() ? sources(path) : /\.(vue|ts)$/.test(entry.name) ? [path] : [];
  });
}

/** What can reach the screen: everything but comments, with escapes read. */
function onScreen(source: string): string {
  return source
    .replace(/<!--[\s\S]*?-->/g, '')
    .replace(/\/\*[\s\S]*?\*\//g, '')
    .replace(/(^|\s)\/\/.*$/gm, '')
    .replace(/\\u([0-9a-f]{4})/gi, (_, code: string) => String.fromCharCode(parseInt(code, 16)));
}

describe('characters on the screen', () => {
  // shared/files writes files and shared/model holds types: neither is drawn.
  const notDrawn = [join('shared', 'files'), join('shared', 'model')];
  const files = [...sources('src'), ...sources('shared')].filter(
    (path) => !notDrawn.some((not) => path.startsWith(not)),
  );

  it('looks at the whole interface', () => {
    expect(files.length).toBeGreaterThan(50);
  });

  it.each(files)('%s stays within the fonts', (path) => {
    const text = onScreen(readFileSync(path, 'utf8'));
    expect([...text].filter((character) => !held.test(character))).toEqual([]);
  });

  it('would notice an arrow', () => {
    expect(held.test('\u2192')).toBe(false);
    expect(held.test('\u2264')).toBe(false);
  });
});
