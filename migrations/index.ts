import type { Knex } from 'knex';
import * as people from './20261201_1_create_people';
import * as targets from './20261201_2_create_targets';
import * as plans from './20261201_3_create_plans';
import * as releases from './20261201_4_create_releases';
import * as guards from './20261201_5_guard_releases';
import * as replays from './20261201_6_create_replays';
import * as audit from './20261201_7_create_audit';

const migrations: Record<string, Knex.Migration> = {
  '20261201_1_create_people': people,
  '20261201_2_create_targets': targets,
  '20261201_3_create_plans': plans,
  '20261201_4_create_releases': releases,
  '20261201_5_guard_releases': guards,
  '20261201_6_create_replays': replays,
  '20261201_7_create_audit': audit,
};

/** Names without extension, so that sources and build leave the same rows in the table of migrations. */
export const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: () => Promise.resolve(Object.keys(migrations)),
  getMigrationName: (name) => name,
  getMigration: (name) => {
    const migration = migrations[name];
    return migration ? Promise.resolve(migration) : Promise.reject(new Error(`no migration is named ${name}`));
  },
};
