import { dropTables, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS releases (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    target_id BIGINT NOT NULL,
    version VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    state ENUM('draft', 'frozen') NOT NULL DEFAULT 'draft',
    row_version INT NOT NULL DEFAULT 1 CHECK (row_version > 0),
    created_by BIGINT NOT NULL,
    created_at DATETIME(3) NOT NULL,
    frozen_by BIGINT NULL,
    frozen_at DATETIME(3) NULL,
    digest CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
    UNIQUE (target_id, version),
    FOREIGN KEY (target_id) REFERENCES targets (id),
    FOREIGN KEY (created_by) REFERENCES people (id),
    FOREIGN KEY (frozen_by) REFERENCES people (id),
    CONSTRAINT frozen_is_whole CHECK (
      (state = 'draft' AND frozen_by IS NULL AND frozen_at IS NULL AND digest IS NULL) OR
      (state = 'frozen' AND frozen_by IS NOT NULL AND frozen_at IS NOT NULL AND digest REGEXP '^[0-9a-f]{64}$')
    )
  )`,
  // No cascades into these two: rows that go by cascade pass no trigger.
  `CREATE TABLE IF NOT EXISTS release_entries (
    release_id BIGINT NOT NULL,
    slot VARCHAR(31) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (slot REGEXP '^[a-z][a-z0-9_]*$'),
    revision_id BIGINT NOT NULL,
    PRIMARY KEY (release_id, slot),
    FOREIGN KEY (release_id) REFERENCES releases (id),
    FOREIGN KEY (revision_id) REFERENCES revisions (id)
  )`,
  `CREATE TABLE IF NOT EXISTS release_files (
    release_id BIGINT NOT NULL,
    name VARCHAR(80) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    content LONGTEXT COLLATE utf8mb4_bin NOT NULL,
    bytes INT NOT NULL CHECK (bytes >= 0),
    sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (sha256 REGEXP '^[0-9a-f]{64}$'),
    PRIMARY KEY (release_id, name),
    FOREIGN KEY (release_id) REFERENCES releases (id)
  )`,
);

export const down = dropTables('release_files', 'release_entries', 'releases');
