import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const flags = ['-pedantic', '-Wall', '-Wextra', '-Wconversion', '-Wshadow', '-Werror'];

/** The languages that a header must compile as: with static assertions and without. */
export const languages = ['c99', 'c11', 'c++11', 'c++20'] as const;
export type Language = (typeof languages)[number];

const isCpp = (language: Language): boolean => language.startsWith('c++');

function inFolder<T>(files: Record<string, string>, act: (folder: string) => T): T {
  const folder = mkdtempSync(join(tmpdir(), 'header-'));
  try {
    for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
    return act(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

const compilerArguments = (language: Language): string[] => [
  `-std=${language}`,
  ...flags,
  '-x',
  isCpp(language) ? 'c++' : 'c',
  'main.c',
];

/** What the compiler says of a program with these headers beside it; empty when it is content. */
export function complaints(headers: Record<string, string>, main: string, language: Language = 'c99'): string {
  return inFolder({ ...headers, 'main.c': main }, (cwd) => {
    const compiler = isCpp(language) ? 'g++' : 'gcc';
    const { status, stderr } = spawnSync(compiler, [...compilerArguments(language), '-fsyntax-only'], {
      cwd,
      encoding: 'utf8',
    });
    return status === 0 ? stderr : stderr || `${compiler} left with ${status}`;
  });
}

/** What a program prints, line by line. */
export function printed(headers: Record<string, string>, main: string, language: Language = 'c99'): string[] {
  return inFolder({ ...headers, 'main.c': main }, (cwd) => {
    execFileSync(isCpp(language) ? 'g++' : 'gcc', [...compilerArguments(language), '-o', 'main'], { cwd });
    return execFileSync(join(cwd, 'main'), { encoding: 'utf8' }).trimEnd().split('\n');
  });
}

/** A program that includes headers and does nothing; it uses the write table where there is one. */
export const including = (...names: string[]): string =>
  `${names.map((name) => `#include "${name}"`).join('\n')}\nint main(void) { return 0; }\n`;
