import { databaseUrl, startDatabase } from '../../scripts/database.mjs';

/**
 * Starts a throw-away MariaDB for the workers, unless whoever started the run has one already: `npm test` does, and
 * so does the first of two test projects that need one. Workers inherit the environment.
 *
 * @returns what ends it, or nothing
 */
export async function setup(): Promise<(() => Promise<void>) | undefined> {
  if (process.env.KEEPSTEP_TEST_OWNER_URL) return undefined;
  const database = await startDatabase();
  process.env.KEEPSTEP_TEST_OWNER_URL = databaseUrl(database, database.owner, database.database);
  process.env.KEEPSTEP_TEST_APP_USER = database.app.user;
  process.env.KEEPSTEP_TEST_APP_PASSWORD = database.app.password;
  return async () => {
    await database.stop();
    delete process.env.KEEPSTEP_TEST_OWNER_URL; // a watching run sets up again
  };
}
