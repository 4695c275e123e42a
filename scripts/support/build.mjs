import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { fingerprint } from './fingerprint.mjs';
import { usingPath } from './refusal.mjs';
import { inRoot, root } from './root.mjs';
import { mustRun } from './run.mjs';
import { nothingToDo, step } from './step.mjs';

/** Everything that has a part in what is built. */
const sources = [
  'src',
  'server',
  'shared',
  'schemas',
  'migrations',
  'seeds',
  'public',
  'index.html',
  'quasar.config.ts',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
  'scripts/build-server.mjs',
];
const stamp = inRoot('dist', '.built-from');

const builtFrom = () => (existsSync(stamp) ? readFileSync(stamp, 'utf8') : undefined);

/** Builds the web application and the server unless both were built from these very sources. */
export async function buildWhenChanged() {
  const wanted = fingerprint(root, sources);
  if (builtFrom() === wanted) return nothingToDo('Application', 'already built');
  rmSync(stamp, { force: true }); // a build that is cut short is not taken for a finished one
  await step('Web application built', () =>
    mustRun([process.execPath, 'node_modules/@quasar/app-vite/bin/quasar.js', 'build']),
  );
  await step('Server built', () => mustRun([process.execPath, 'scripts/build-server.mjs']));
  usingPath(stamp, () => {
    mkdirSync(inRoot('dist'), { recursive: true });
    writeFileSync(stamp, wanted);
  });
}
