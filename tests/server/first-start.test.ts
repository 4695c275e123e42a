import type { Knex } from 'knex';
import { pino } from 'pino';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readConfig, type Config } from '../../server/config';
import { openDb } from '../../server/db';
import { firstStart } from '../../server/first-start';
import { migrate } from '../../server/migrate';
import { idleQueue } from '../../server/replay-queue/idle-queue';
import { createServices } from '../../server/services/index';
import { createTestDatabase, type TestDatabase } from '../support/create-database';

let database: TestDatabase;
let db: Knex;
let printed: string[];

beforeEach(async () => {
  database = await createTestDatabase();
  const owner = openDb(database.ownerUrl, { connections: 3 });
  await migrate(owner);
  await owner.destroy();
  db = openDb(database.appUrl);
  printed = [];
});
afterEach(async () => {
  await db.destroy();
  await database.drop();
});

const base = {
  clock: () => new Date(),
  logger: pino({ level: 'silent' }),
  secret: 'x'.repeat(32),
  publicUrl: 'http://a.example',
};
const servicesOver = (over: Knex) => createServices({ ...base, db: over }, idleQueue);
const configOf = (env: Record<string, string | undefined>): Config =>
  readConfig({ DATABASE_URL: database.appUrl, ...env });
const start = (env: Record<string, string | undefined>) =>
  firstStart(db, configOf(env), servicesOver, (line) => void printed.push(line));

describe('the first start on the embedded database', () => {
  it('makes the demo: five people, five plans, a frozen release, a draft and a replay', async () => {
    await start({ KEEPSTEP_EMBEDDED: '1', KEEPSTEP_DEMO_PASSWORD: 'the demo password' });
    expect(await db('people').orderBy('id').pluck('email')).toEqual(
      ['engineer', 'tester', 'release', 'viewer', 'admin'].map((role) => `${role}@keepstep.example`),
    );
    expect(await db('plans')).toHaveLength(5);
    expect(await db('releases').orderBy('id').select('version', 'state')).toEqual([
      { version: '2.3.0', state: 'frozen' },
      { version: '2.4.0', state: 'draft' },
    ]);
    expect(await db('replays').pluck('state')).toEqual(['queued']);
    const tokens = await servicesOver(db).sessions.signIn('viewer@keepstep.example', 'the demo password', '');
    expect(tokens.user.role).toBe('viewer');
    expect(printed).toEqual([]);
  });

  it('has one plan that must not be released as it is, and no other', async () => {
    await start({ KEEPSTEP_EMBEDDED: '1' });
    const heads = db('plans').join('revisions', 'revisions.id', 'plans.head_revision_id');
    expect(await heads.where('fail_count', '>', 0).pluck('plans.name')).toEqual(['Hop burst, QPSK 400 k']);
  });

  it('is the first one only', async () => {
    await start({ KEEPSTEP_EMBEDDED: '1' });
    await start({ KEEPSTEP_EMBEDDED: '1', KEEPSTEP_DEMO_PASSWORD: 'another password' });
    expect(await db('people')).toHaveLength(5);
  });

  it('leaves nothing when it is cut short', async () => {
    const broken = (over: Knex) => {
      const services = servicesOver(over);
      return { ...services, releases: { ...services.releases, freeze: () => Promise.reject(new Error('cut short')) } };
    };
    const run = firstStart(db, configOf({ KEEPSTEP_EMBEDDED: '1' }), broken, () => undefined);
    await expect(run).rejects.toThrow('cut short');
    expect(await db('people')).toEqual([]);
    expect(await db('revisions')).toEqual([]);
  });
});

describe('the first start elsewhere', () => {
  it.each([{}, { KEEPSTEP_EMBEDDED: '1', NODE_ENV: 'production' }])(
    'prints the link of the first admin, and again until somebody has a password: %o',
    async (env) => {
      await start(env);
      await start(env);
      expect(printed).toHaveLength(2);
      const [first, second] = printed.map((line) => /http:\/\/a\.example\/password\/([\w-]{43})$/.exec(line)![1]!);
      const { passwords, sessions } = servicesOver(db);
      await expect(passwords.setByLink(first!, 'a password of admin')).rejects.toThrow(/no such link/);
      await passwords.setByLink(second!, 'a password of admin');
      await start(env);
      expect(printed).toHaveLength(2);
      const { user } = await sessions.signIn('admin@localhost', 'a password of admin', '');
      expect(user.role).toBe('admin');
      expect(await db('plans')).toEqual([]);
    },
  );
});
