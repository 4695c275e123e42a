import type { Express } from 'express';
import type { Knex } from 'knex';
import { pino, type DestinationStream } from 'pino';
import supertest from 'supertest';
import { createApp } from '../../server/app';
import { openDb } from '../../server/db';
import { migrate } from '../../server/migrate';
import { idleQueue } from '../../server/replay-queue/idle-queue';
import type { ReplayQueue, ReplayStore } from '../../server/replay-queue/replay-queue';
import { repositories } from '../../server/repositories/index';
import { roles, type Role } from '../../server/roles';
import { accessToken } from '../../server/services/access-tokens';
import { createServices, type Services } from '../../server/services/index';
import type { SignedIn } from '../../server/services/sessions';
import { createTestDatabase } from './create-database';

/** One person for each role, signed in. */
export type People = Record<Role, SignedIn>;

export interface TestServer {
  app: Express;
  /** Pool of the application's user. */
  db: Knex;
  /** Pool of the user who migrates. */
  owner: Knex;
  services: Services;
  people: People;
  /** Stands still until a test moves it. */
  clock: { now: Date };
  /** Calls the API as the person of a role, or signed out. Paths begin behind /api/v1. */
  as: (role?: Role) => Client;
  stop(): Promise<void>;
}

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';
export type Client = Record<Method, (path: string, body?: object) => supertest.Test>;

export interface TestOptions {
  queue?: (store: ReplayStore) => ReplayQueue;
  log?: DestinationStream;
  webFolder?: string;
  secure?: boolean;
}

export const testSecret = 'a secret of these tests, 32 characters or more';
const publicUrl = 'http://keepstep.example';

async function signIn(db: Knex, clock: { now: Date }, person: Omit<SignedIn, 'sessionId'>): Promise<SignedIn> {
  const expiresAt = new Date(clock.now.getTime() + 3_600_000);
  const session = { personId: person.id, userAgent: 'test', at: clock.now, expiresAt };
  return { ...person, sessionId: await repositories(db).sessions.insert(session) };
}

async function invitePeople(db: Knex, services: Services, clock: { now: Date }): Promise<People> {
  const people: Partial<People> = {};
  for (const role of roles) {
    const { person } = await services.people.invite({ email: `${role}@test.example`, name: `The ${role}`, role }, null);
    people[role] = await signIn(db, clock, { id: person.id, email: person.email, name: person.name, role });
  }
  return people as People;
}

/** The application on a database of its own, migrated and empty but for the people. */
export async function startTestServer(options: TestOptions = {}): Promise<TestServer> {
  const { queue = idleQueue, log, webFolder = '/nowhere', secure = false } = options;
  const database = await createTestDatabase();
  const owner = openDb(database.ownerUrl, { connections: 3 });
  await migrate(owner);
  const db = openDb(database.appUrl, { connections: 12 });
  const clock = { now: new Date() };
  const logger = log ? pino({ level: 'debug' }, log) : pino({ level: 'silent' });
  const services = createServices({ db, clock: () => clock.now, logger, secret: testSecret, publicUrl }, queue);
  const app = createApp({ services, secret: testSecret, logger, webFolder, secure, demo: false });
  const people = await invitePeople(db, services, clock);

  const tokenOf = ({ id, sessionId }: SignedIn) => accessToken(id, sessionId, testSecret, clock.now);
  function as(role?: Role): Client {
    const call = (method: Method) => (path: string, body?: object) => {
      const test = supertest(app)[method](`/api/v1${path}`);
      if (role) void test.set('Authorization', `Bearer ${tokenOf(people[role])}`);
      return body === undefined ? test : test.send(body);
    };
    return { get: call('get'), post: call('post'), put: call('put'), patch: call('patch'), delete: call('delete') };
  }
  async function stop(): Promise<void> {
    await services.replayQueue.stop();
    await Promise.all([db.destroy(), owner.destroy()]);
    await database.drop();
  }
  return { app, db, owner, services, people, clock, as, stop };
}
