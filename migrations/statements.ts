import type { Knex } from 'knex';

/**
 * A migration step that runs statements in order. MariaDB commits each table and trigger by itself, so a step that was
 * cut short runs again from its beginning: every statement must bear that (`IF NOT EXISTS`, `OR REPLACE`).
 */
export const runAll =
  (...statements: string[]) =>
  async (db: Knex): Promise<void> => {
    for (const statement of statements) await db.raw(statement);
  };

export const dropTables = (...tables: string[]) => runAll(...tables.map((table) => `DROP TABLE IF EXISTS ${table}`));

export const dropTriggers = (...triggers: string[]) =>
  runAll(...triggers.map((trigger) => `DROP TRIGGER IF EXISTS ${trigger}`));

/** A trigger that refuses its event with a sentence for people; `when` is a condition over OLD and NEW. */
export const refuse = (name: string, event: string, when: string, sentence: string): string =>
  `CREATE OR REPLACE TRIGGER ${name} BEFORE ${event} FOR EACH ROW
   BEGIN
     IF ${when} THEN
       SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = '${sentence}';
     END IF;
   END`;
