import type { Knex } from 'knex';
import { migrationSource } from '../migrations/index';

// Advisory locks of MariaDB are named for the whole server, and die with the connection that holds them.
const lock = `CONCAT('keepstep migrates ', DATABASE())`;

/** Two servers that start at once migrate one after the other; a start that was killed leaves no lock behind. */
async function locked<T>(db: Knex, work: () => Promise<T>): Promise<T> {
  return db.transaction(async (holder) => {
    await holder.raw(`SELECT GET_LOCK(${lock}, 60)`);
    try {
      return await work();
    } finally {
      await holder.raw(`SELECT RELEASE_LOCK(${lock})`);
    }
  });
}

/**
 * Brings the tables up to date.
 *
 * @param db pool of a user who may create tables and triggers, of at least two connections
 * @returns names of the migrations that were run
 */
export function migrate(db: Knex): Promise<string[]> {
  return locked(db, async () => {
    // Tables commit by themselves in MariaDB: a transaction around them would promise what it cannot keep.
    const config = { migrationSource, disableTransactions: true };
    await db.migrate.forceFreeMigrationsLock(config);
    const [, names] = (await db.migrate.latest(config)) as [number, string[]];
    return names;
  });
}
