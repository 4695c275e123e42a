import type { Knex } from 'knex';
import { seedDemo } from '../seeds/index';
import type { Config } from './config';
import type { Services } from './services/index';

/** Demo accounts have a known password: they are for a database that nobody else reaches. */
const wantsDemo = ({ embedded, production }: Config): boolean => embedded && !production;

/**
 * Fills an empty database: with the demo where that is allowed, otherwise with an admin who sets a password by the
 * link that is printed. Nothing happens once somebody can sign in.
 *
 * @param servicesOver makes services over one transaction: a first start that is cut short leaves nothing half done
 */
export async function firstStart(
  db: Knex,
  config: Config,
  servicesOver: (db: Knex) => Services,
  print: (line: string) => void,
): Promise<void> {
  const { people } = servicesOver(db);
  if (wantsDemo(config)) {
    if (!(await people.any())) await db.transaction((trx) => seedDemo(servicesOver(trx), config.demoPassword));
    return;
  }
  const link = await people.firstAdminLink(config.adminEmail);
  if (link)
    print(`Nobody can sign in yet. Open this link within three days to become admin (${config.adminEmail}): ${link}`);
}
