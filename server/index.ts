import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Knex } from 'knex';
import type { Logger } from 'pino';
import { createApp } from './app';
import { ConfigError, readConfig, type Config } from './config';
import { databaseCode } from './database-refusal';
import { openDb } from './db';
import { firstStart } from './first-start';
import { createLogger } from './log';
import { migrate } from './migrate';
import { idleQueue } from './replay-queue/idle-queue';
import { workerThreadQueue } from './replay-queue/worker-threads';
import { createServices, type Services } from './services/index';
import { signingSecret } from './signing-secret';
import { webFolder } from './web-folder';

async function migrateAsOwner({ databaseUrl, databaseOwnerUrl }: Config, logger: Logger): Promise<void> {
  if (!databaseOwnerUrl)
    logger.warn('DATABASE_OWNER_URL is not set: the application’s own user migrates and could drop triggers');
  const owner = openDb(databaseOwnerUrl ?? databaseUrl, { connections: 3 });
  try {
    const names = await migrate(owner);
    if (names.length > 0) logger.info({ names }, 'migrated');
  } finally {
    await owner.destroy();
  }
}

const listen = (server: Server, { host, port }: Config): Promise<void> =>
  new Promise((resolve, reject) => {
    server.once('error', reject).listen(port, host, () => resolve(server.off('error', reject) && undefined));
  });

/** Answers what is under way, ends streams, puts a running replay back, then closes the pool. */
async function shutDown(server: Server, services: Services, db: Knex): Promise<void> {
  const closed = new Promise((resolve) => server.close(resolve));
  services.replayEvents.end();
  server.closeIdleConnections();
  const patience = setTimeout(() => server.closeAllConnections(), 5_000);
  await Promise.all([closed, services.replayQueue.stop()]);
  clearTimeout(patience);
  await db.destroy();
}

async function start(config: Config): Promise<void> {
  const logger = createLogger(config.logLevel);
  await migrateAsOwner(config, logger);
  const db = openDb(config.databaseUrl, { connections: 16 });
  const secret = config.secret ?? signingSecret(config.dataDir);
  const base = { clock: () => new Date(), logger, secret, publicUrl: config.publicUrl };
  await firstStart(db, config, (over) => createServices({ ...base, db: over }, idleQueue), console.log);

  const services = createServices({ ...base, db }, (store) => workerThreadQueue(store, logger));
  await services.sessions.sweep();
  const demo = config.embedded && !config.production;
  const secure = config.publicUrl.startsWith('https:');
  const server = createServer(createApp({ services, secret, logger, webFolder, secure, demo }));
  await listen(server, config);
  await services.replayQueue.start();

  const stop = () => void shutDown(server, services, db).then(() => process.exit(0), fail);
  process.once('SIGTERM', stop).once('SIGINT', stop);
  const { port } = server.address() as AddressInfo;
  const address = `http://${config.host}:${port}`;
  logger.info({ address }, 'listening');
  process.send?.({ ready: true, address });
}

const silent = new Set([
  'ECONNREFUSED',
  'ENOTFOUND',
  'ETIMEDOUT',
  'EHOSTUNREACH',
  'ECONNRESET',
  'PROTOCOL_CONNECTION_LOST',
]);

/** The reason of a start that did not succeed, in one sentence where it is one that people meet. */
function sentenceOf(error: unknown): string | undefined {
  if (error instanceof ConfigError) return error.message;
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (code === 'EADDRINUSE') return 'The port is taken by another program. Set PORT to a free one.';
  if (code === 'EACCES') return 'The port may not be opened by this user. Set PORT to one above 1023.';
  if (silent.has(code)) return 'The database does not answer. Check DATABASE_URL and that it runs.';
  if (databaseCode(error) === 'ER_ACCESS_DENIED_ERROR')
    return 'The database refuses the user or the password of DATABASE_URL.';
  return undefined;
}

function fail(error: unknown): never {
  console.error(sentenceOf(error) ?? error);
  process.exit(1);
}

try {
  await start(readConfig(process.env));
} catch (error) {
  fail(error);
}
