import { randomBytes } from 'node:crypto';
import { createConnection } from 'mysql2/promise';

export interface TestDatabase {
  /** Address for the user who may change tables and triggers. */
  readonly ownerUrl: string;
  /** Address for the application's user, who may read and write rows. */
  readonly appUrl: string;
  drop(): Promise<void>;
}

function variable(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is absent: tests/support/database.ts must be the project's globalSetup.`);
  return value;
}

async function asOwner(url: string, statement: string): Promise<void> {
  const connection = await createConnection(url);
  try {
    await connection.query(statement);
  } finally {
    await connection.end();
  }
}

/** Makes an empty database of its own for one test file. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const server = variable('KEEPSTEP_TEST_OWNER_URL');
  const name = `keepstep_test_${randomBytes(8).toString('hex')}`;
  await asOwner(server, `CREATE DATABASE ${name}`);
  const [owner, app] = [new URL(server), new URL(server)];
  owner.pathname = app.pathname = `/${name}`;
  app.username = variable('KEEPSTEP_TEST_APP_USER');
  app.password = variable('KEEPSTEP_TEST_APP_PASSWORD');
  return { ownerUrl: owner.href, appUrl: app.href, drop: () => asOwner(server, `DROP DATABASE ${name}`) };
}
