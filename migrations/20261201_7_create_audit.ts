import { dropTables, refuse, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS audit (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    at DATETIME(3) NOT NULL,
    person_id BIGINT NULL,
    action VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    subject VARCHAR(200) NOT NULL,
    detail LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(detail)),
    FOREIGN KEY (person_id) REFERENCES people (id)
  )`,
  refuse('audit_update', 'UPDATE ON audit', 'TRUE', 'The audit trail cannot be changed.'),
  refuse('audit_delete', 'DELETE ON audit', 'TRUE', 'The audit trail cannot be shortened.'),
);

export const down = dropTables('audit');
