// The server from its sources and the web application by its development server; each reloads when a file changes.
import { dataFolder, databaseEnvironment, embeddedDatabase } from './support/embedded-database.mjs';
import { portFromEnvironment } from './support/ports.mjs';
import { runMain } from './support/refusal.mjs';
import { askedToEnd, firstToEnd, supervise } from './support/supervise.mjs';

function startBoth(database, { apiPort, webPort }) {
  const ports = { API_PORT: String(apiPort), WEB_PORT: String(webPort) };
  const environment = {
    ...ports,
    ...databaseEnvironment(database),
    HOST: '127.0.0.1',
    PORT: String(apiPort),
    KEEPSTEP_DATA_DIR: process.env.KEEPSTEP_DATA_DIR || dataFolder,
    KEEPSTEP_PUBLIC_URL: process.env.KEEPSTEP_PUBLIC_URL || `http://127.0.0.1:${webPort}`,
  };
  const { execPath } = process;
  return {
    'The server': supervise(
      [execPath, 'node_modules/tsx/dist/cli.mjs', 'watch', '--clear-screen=false', 'server/index.ts'],
      environment,
    ),
    'The web application': supervise([execPath, 'node_modules/@quasar/app-vite/bin/quasar.js', 'dev'], ports),
  };
}

await runMain(async () => {
  const apiPort = await portFromEnvironment('API_PORT', 8081);
  const webPort = await portFromEnvironment('WEB_PORT', 9000);
  const database = await embeddedDatabase();
  console.log(`\nKeepstep  http://127.0.0.1:${webPort} reloads as files change; Ctrl-C stops.\n`);
  const parts = startBoth(database, { apiPort, webPort });
  const ends = Object.fromEntries(Object.entries(parts).map(([name, part]) => [name, part.ended]));
  try {
    const sentence = await firstToEnd({ ...ends, ...(database && { 'The database': database.ended }) }, askedToEnd());
    if (sentence) console.error(sentence);
    return sentence ? 1 : 0;
  } finally {
    await Promise.all(Object.values(parts).map((part) => part.stop()));
    await database?.stop();
  }
});
process.exit();
