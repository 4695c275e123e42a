import type { Knex } from 'knex';
import { dropTables, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS plans (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    target_id BIGINT NOT NULL,
    name VARCHAR(80) NOT NULL CHECK (name <> ''),
    modulation VARCHAR(10) NOT NULL,
    symbol_rate_bd DOUBLE NOT NULL CHECK (symbol_rate_bd > 0),
    description LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(description)),
    head_revision_id BIGINT NULL,
    version INT NOT NULL DEFAULT 1 CHECK (version > 0),
    created_by BIGINT NOT NULL,
    created_at DATETIME(3) NOT NULL,
    changed_at DATETIME(3) NOT NULL,
    FOREIGN KEY (target_id) REFERENCES targets (id),
    FOREIGN KEY (created_by) REFERENCES people (id)
  )`,
  `CREATE TABLE IF NOT EXISTS revisions (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    plan_id BIGINT NOT NULL,
    number INT NOT NULL CHECK (number > 0),
    target_id BIGINT NOT NULL,
    note VARCHAR(500) NOT NULL,
    engine VARCHAR(20) NOT NULL,
    digest CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (digest REGEXP '^[0-9a-f]{64}$'),
    description LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(description)),
    design LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(design)),
    tables LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(tables)),
    target LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(target)),
    summary LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(summary)),
    pass_count INT NOT NULL CHECK (pass_count >= 0),
    caution_count INT NOT NULL CHECK (caution_count >= 0),
    fail_count INT NOT NULL CHECK (fail_count >= 0),
    saved_by BIGINT NOT NULL,
    saved_at DATETIME(3) NOT NULL,
    UNIQUE (plan_id, number),
    FOREIGN KEY (plan_id) REFERENCES plans (id),
    FOREIGN KEY (target_id) REFERENCES targets (id),
    FOREIGN KEY (saved_by) REFERENCES people (id)
  )`,
  `ALTER TABLE plans ADD CONSTRAINT plans_head FOREIGN KEY IF NOT EXISTS (head_revision_id) REFERENCES revisions (id)`,
  `CREATE TABLE IF NOT EXISTS drafts (
    plan_id BIGINT NOT NULL,
    person_id BIGINT NOT NULL,
    based_on INT NOT NULL CHECK (based_on >= 0),
    plan LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(plan)),
    typed LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(typed)),
    updated_at DATETIME(3) NOT NULL,
    PRIMARY KEY (plan_id, person_id),
    FOREIGN KEY (plan_id) REFERENCES plans (id),
    FOREIGN KEY (person_id) REFERENCES people (id)
  )`,
);

export const down = async (db: Knex): Promise<void> => {
  await runAll('ALTER TABLE plans DROP FOREIGN KEY IF EXISTS plans_head')(db);
  await dropTables('drafts', 'revisions', 'plans')(db);
};
