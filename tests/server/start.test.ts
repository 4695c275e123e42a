import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type Server } from 'node:net';
import { fileURLToPath } from 'node:url';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/create-database';
import { freePort } from '../support/running-server';
import { temporaryFolder } from '../support/temporary-folder';

const source = fileURLToPath(new URL('../../server/index.ts', import.meta.url));
const password = 'a password of this test';

let database: TestDatabase;
let env: Record<string, string>;
const running = new Set<ChildProcess>();

beforeAll(async () => {
  database = await createTestDatabase();
  env = {
    DATABASE_URL: database.appUrl,
    DATABASE_OWNER_URL: database.ownerUrl,
    KEEPSTEP_DATA_DIR: temporaryFolder('start'),
    KEEPSTEP_EMBEDDED: '1',
    KEEPSTEP_DEMO_PASSWORD: password,
    LOG_LEVEL: 'warn',
  };
});
afterAll(async () => {
  for (const child of running) child.kill('SIGKILL');
  await database.drop();
});

interface Started {
  child: ChildProcess;
  said: () => string;
  exit: Promise<number | null>;
}

function start(changes: Record<string, string>): Started {
  const child = spawn(process.execPath, ['--import', 'tsx', source], {
    env: { PATH: process.env.PATH, ...env, ...changes },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  running.add(child);
  let said = '';
  for (const stream of [child.stdout!, child.stderr!]) stream.on('data', (text: Buffer) => (said += text.toString()));
  const exit = once(child, 'close').then(([code]) => {
    running.delete(child);
    return code as number | null;
  });
  return { child, said: () => said, exit };
}

/** Starts and waits until it listens. @returns with the address that it tells its parent */
async function listening(port: number): Promise<Started & { address: string }> {
  const started = start({ PORT: String(port) });
  const ended = started.exit.then(() => Promise.reject(new Error(started.said())));
  const [message] = (await Promise.race([once(started.child, 'message'), ended])) as [{ ready: true; address: string }];
  return { ...started, address: message.address };
}

async function tokenOf(address: string, who: string): Promise<string> {
  const body = JSON.stringify({ email: `${who}@keepstep.example`, password });
  const headers = { 'content-type': 'application/json' };
  const answer = await fetch(`${address}/api/v1/session`, { method: 'POST', headers, body });
  return ((await answer.json()) as { accessToken: string }).accessToken;
}

interface Replay {
  id: number;
  state: string;
  pointsDone: number;
}

const replay = async (address: string, authorization: string): Promise<Replay> =>
  (await (await fetch(`${address}/api/v1/replays/1`, { headers: { authorization } })).json()) as Replay;

describe('the server', () => {
  it.each([
    [{ DATABASE_URL: '' }, 'DATABASE_URL must be an address that begins with mysql:// or mariadb://.'],
    [{ PORT: 'http' }, 'PORT must be a whole number from 0 to 65535, not “http”.'],
    [
      { DATABASE_URL: 'mysql://a:b@127.0.0.1:9/x', DATABASE_OWNER_URL: '' },
      'The database does not answer. Check DATABASE_URL and that it runs.',
    ],
  ])('ends with one sentence for %o', async (changes, sentence) => {
    const { exit, said } = start(changes);
    expect(await exit).toBe(1);
    expect(said().trim().split('\n').at(-1), said()).toBe(sentence);
    expect(said()).not.toMatch(/\n\s+at /);
  });

  it('ends with one sentence when its port is taken', async () => {
    const port = await freePort();
    const taken: Server = createServer();
    await new Promise<void>((resolve) => taken.listen(port, '127.0.0.1', resolve));
    const { exit, said } = start({ PORT: String(port) });
    expect(await exit).toBe(1);
    expect(said().trim()).toBe('The port is taken by another program. Set PORT to a free one.');
    await new Promise((resolve) => taken.close(resolve));
  });

  it('goes on after kill -9 where it was, and ends in order on SIGTERM', async () => {
    const port = await freePort();
    const first = await listening(port);
    expect(first.address).toBe(`http://127.0.0.1:${port}`);
    const authorization = `Bearer ${await tokenOf(first.address, 'viewer')}`;
    while ((await replay(first.address, authorization)).pointsDone < 1) await sleep(20);
    first.child.kill('SIGKILL');
    await first.exit;

    const second = await listening(port);
    // The secret outlives the process, so the session does too.
    while ((await replay(second.address, authorization)).state !== 'done') await sleep(50);
    const stream = fetch(`${second.address}/api/v1/replays/1/events`, { headers: { authorization } });
    expect((await stream).status).toBe(200);
    second.child.kill('SIGTERM');
    expect(await second.exit).toBe(0);
    expect(second.said()).toBe('');
  }, 120_000);
});
