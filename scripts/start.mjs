// Builds when sources changed, starts the database and the server, and ends them together.
import { buildWhenChanged } from './support/build.mjs';
import { dataFolder, databaseEnvironment, embeddedDatabase } from './support/embedded-database.mjs';
import { greeting } from './support/greeting.mjs';
import { portFromEnvironment } from './support/ports.mjs';
import { runMain } from './support/refusal.mjs';
import { step, stepWithOutput } from './support/step.mjs';
import { askedToEnd, firstToEnd, supervise } from './support/supervise.mjs';

const host = process.env.HOST || '127.0.0.1';

function serverEnvironment(database, port) {
  return {
    ...databaseEnvironment(database),
    HOST: host,
    PORT: String(port),
    KEEPSTEP_DATA_DIR: process.env.KEEPSTEP_DATA_DIR || dataFolder,
    // A terminal is no place for a line about every request; a service's journal is.
    LOG_LEVEL: process.env.LOG_LEVEL || (database ? 'warn' : 'info'),
  };
}

function greet(address, database) {
  const embedded = database !== undefined;
  console.log(greeting({ address, dataFolder, demo: embedded && process.env.NODE_ENV !== 'production', embedded }));
}

/** @returns {Promise<number>} the exit code */
async function serve(server, database) {
  const parts = { 'The server': server.ended, ...(database && { 'The database': database.ended }) };
  const end = firstToEnd(parts, askedToEnd());
  const ready = await stepWithOutput('Server ready', () => Promise.race([server.ready, end.then(() => undefined)]));
  if (ready) greet(ready.address, database);
  const ended = await end;
  // A server that did not start has said why.
  if (ended && (ready || !ended.includes('exit code'))) console.error(ended);
  return ended ? 1 : 0;
}

await runMain(async () => {
  const port = await portFromEnvironment('PORT', 8080, host);
  const database = await embeddedDatabase();
  try {
    await buildWhenChanged();
    const command = [process.execPath, '--enable-source-maps', 'dist/server/index.js'];
    const server = supervise(command, serverEnvironment(database, port));
    const code = await serve(server, database);
    await (code === 0 ? step('Stopping', () => server.stop()) : server.stop());
    return code;
  } finally {
    await database?.stop();
  }
});
process.exit();
