import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { createTestDatabase } from './create-database';

const built = fileURLToPath(new URL('../../dist/server/index.js', import.meta.url));
export const demoPassword = 'a-password-of-this-test-run';

/** A port that is free now and below the range of outgoing connections, so that nothing takes it meanwhile. */
export async function freePort(): Promise<number> {
  for (;;) {
    const port = 20_000 + Math.floor(Math.random() * 12_000);
    const probe = createServer();
    const free = await new Promise<boolean>((done) => {
      probe.once('error', () => done(false));
      probe.listen(port, '127.0.0.1', () => probe.close(() => done(true)));
    });
    if (free) return port;
  }
}

async function ready(child: ChildProcess, said: string[]): Promise<void> {
  const exit = once(child, 'exit').then(() =>
    Promise.reject(new Error(`server ended before it listened:\n${said.join('')}`)),
  );
  await Promise.race([once(child, 'message'), exit]);
}

/** The built server as people run it, with the demo, on a database of its own. */
export async function startServer(): Promise<{ address: string; stop(): Promise<void> }> {
  const database = await createTestDatabase();
  const data = mkdtempSync(join(tmpdir(), 'keepstep-data-'));
  const port = await freePort();
  const child = spawn(process.execPath, [built], {
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    env: {
      ...process.env,
      NODE_ENV: 'test',
      PORT: String(port),
      DATABASE_URL: database.appUrl,
      DATABASE_OWNER_URL: database.ownerUrl,
      KEEPSTEP_EMBEDDED: '1',
      KEEPSTEP_DATA_DIR: data,
      KEEPSTEP_DEMO_PASSWORD: demoPassword,
      LOG_LEVEL: 'warn',
    },
  });
  const said: string[] = [];
  for (const stream of [child.stdout, child.stderr]) stream?.on('data', (text: Buffer) => said.push(text.toString()));
  await ready(child, said);
  return {
    address: `http://127.0.0.1:${port}`,
    async stop() {
      const gone = once(child, 'exit');
      child.kill('SIGTERM');
      await gone;
      await database.drop();
      rmSync(data, { recursive: true, force: true });
    },
  };
}
