import { dropTables, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS people (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    email VARCHAR(254) COLLATE utf8mb4_bin NOT NULL UNIQUE CHECK (email = LOWER(email)),
    name VARCHAR(80) NOT NULL CHECK (name <> ''),
    role ENUM('engineer', 'tester', 'release', 'viewer', 'admin') NOT NULL,
    active BOOLEAN NOT NULL DEFAULT TRUE,
    password_hash VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NULL,
    created_at DATETIME(3) NOT NULL,
    last_seen_at DATETIME(3) NULL,
    version INT NOT NULL DEFAULT 1 CHECK (version > 0)
  )`,
  // A session is a family of refresh tokens: each is used once and replaced by the next.
  `CREATE TABLE IF NOT EXISTS sessions (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    person_id BIGINT NOT NULL,
    user_agent VARCHAR(255) NOT NULL,
    created_at DATETIME(3) NOT NULL,
    last_used_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    revoked_at DATETIME(3) NULL,
    FOREIGN KEY (person_id) REFERENCES people (id)
  )`,
  `CREATE TABLE IF NOT EXISTS refresh_tokens (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    session_id BIGINT NOT NULL,
    token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    created_at DATETIME(3) NOT NULL,
    used_at DATETIME(3) NULL,
    FOREIGN KEY (session_id) REFERENCES sessions (id) ON DELETE CASCADE
  )`,
  `CREATE TABLE IF NOT EXISTS password_links (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    person_id BIGINT NOT NULL,
    token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    used_at DATETIME(3) NULL,
    FOREIGN KEY (person_id) REFERENCES people (id)
  )`,
);

export const down = dropTables('password_links', 'refresh_tokens', 'sessions', 'people');
