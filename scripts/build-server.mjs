// Bundles our own code: the server, and each file that a worker thread starts from. Packages stay in node_modules.
import { readdirSync } from 'node:fs';
import { build } from 'esbuild';
import { inRoot, root } from './support/root.mjs';

const isWorker = (name) => /(^|-)worker\.ts$/.test(name);
const workers = readdirSync(inRoot('server', 'replay-queue')).filter(isWorker);

await build({
  absWorkingDir: root,
  entryPoints: ['server/index.ts', ...workers.map((name) => `server/replay-queue/${name}`)],
  outbase: 'server',
  outdir: 'dist/server',
  bundle: true,
  packages: 'external',
  platform: 'node',
  format: 'esm',
  target: 'node20',
  sourcemap: true,
  logLevel: 'warning',
});
