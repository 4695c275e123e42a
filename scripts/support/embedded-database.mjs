import { databaseUrl, startDatabase } from '../database.mjs';
import { inRoot } from './root.mjs';
import { nothingToDo, step } from './step.mjs';

/** Where everything is that outlives a start. */
export const dataFolder = inRoot('var');

/** @returns {Promise<import('../database.mjs').Database | undefined>} undefined: DATABASE_URL names another one */
export async function embeddedDatabase() {
  if (process.env.DATABASE_URL) return nothingToDo('Database', 'the one of DATABASE_URL');
  return step('Database', () => startDatabase({ dir: inRoot('var', 'db') }));
}

/**
 * What the server has to know of the database.
 *
 * @param {import('../database.mjs').Database | undefined} database
 * @returns {Record<string, string>}
 */
export function databaseEnvironment(database) {
  if (!database) return {};
  return {
    DATABASE_URL: databaseUrl(database, database.app, database.database),
    DATABASE_OWNER_URL: databaseUrl(database, database.owner, database.database),
    KEEPSTEP_EMBEDDED: '1',
  };
}
