// Every check there is, against a throw-away database; the last line is the count.
import { randomUUID } from 'node:crypto';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { databaseUrl, startDatabase } from './database.mjs';
import { buildWhenChanged } from './support/build.mjs';
import { countsOfReport, one, total } from './support/counts.mjs';
import { processesWith } from './support/left-over.mjs';
import { Refusal } from './support/refusal.mjs';
import { run } from './support/run.mjs';
import { step } from './support/step.mjs';
import { askedToEnd } from './support/supervise.mjs';

const { execPath } = process;
// Every process of this run carries it, whoever starts it.
const runId = { name: 'KEEPSTEP_TEST_RUN', value: randomUUID() };
const env = { [runId.name]: runId.value };

async function check(label, command) {
  console.log(`\n${label}`);
  const begin = performance.now();
  const { code } = await run(command, { env, show: true });
  console.log(`${label} … ${code === 0 ? 'passed' : 'failed'}, ${((performance.now() - begin) / 1000).toFixed(1)} s`);
  return one(code === 0);
}

async function build() {
  try {
    await buildWhenChanged();
    return one(true);
  } catch (error) {
    console.error(error instanceof Refusal ? error.message : error);
    return one(false);
  }
}

const testEnvironment = (database) => ({
  ...env,
  KEEPSTEP_TEST_OWNER_URL: databaseUrl(database, database.owner, database.database),
  KEEPSTEP_TEST_APP_USER: database.app.user,
  KEEPSTEP_TEST_APP_PASSWORD: database.app.password,
});

async function runTests(database) {
  const folder = mkdtempSync(join(tmpdir(), 'keepstep-report-'));
  const path = join(folder, 'report.json');
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${path}`];
  try {
    const command = [execPath, 'node_modules/vitest/vitest.mjs', 'run', ...reporters];
    const { code } = await run(command, { env: testEnvironment(database), show: true });
    return countsOfReport(existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : undefined, code);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function tests() {
  const database = await step('Database', () => startDatabase());
  try {
    return await runTests(database);
  } finally {
    await database.stop();
  }
}

/** What a test left running is a failure of that test. */
function endLeftOvers() {
  const left = processesWith(runId.name, runId.value);
  for (const { pid, command } of left) {
    console.error(`Left running by a test, ended now: ${command}`);
    process.kill(pid, 'SIGKILL');
  }
  return { passed: 0, failed: left.length, skipped: 0 };
}

let interrupted = false;
void askedToEnd().then(() => {
  interrupted = true;
  endLeftOvers();
});

const parts = [
  () => check('Model', [execPath, 'scripts/generate-model.mjs', '--check']),
  () => check('Lint', ['npm', 'run', '--silent', 'lint']),
  () => check('Type check', ['npm', 'run', '--silent', 'typecheck']),
  build,
  tests,
  endLeftOvers,
];

const counts = [];
for (const part of parts) counts.push(interrupted ? one(false) : await part());
const { passed, failed, skipped } = total(counts);
if (skipped > 0) console.log(`${skipped} skipped`);
console.log(`\n${passed} passed, ${failed} failed`);
process.exit(failed === 0 ? 0 : 1);
