import { dropTables, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS targets (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    slug VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE CHECK (slug REGEXP '^[a-z][a-z0-9-]*$'),
    name VARCHAR(80) NOT NULL CHECK (name <> ''),
    loop_clock_hz DOUBLE NOT NULL CHECK (loop_clock_hz > 0),
    c_prefix VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    base_address VARCHAR(18) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    register_map LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(register_map)),
    map_number INT NOT NULL DEFAULT 1 CHECK (map_number > 0),
    version INT NOT NULL DEFAULT 1 CHECK (version > 0),
    created_at DATETIME(3) NOT NULL,
    changed_at DATETIME(3) NOT NULL
  )`,
);

export const down = dropTables('targets');
