import { dropTables, runAll } from './statements';

export const up = runAll(
  `CREATE TABLE IF NOT EXISTS replays (
    id BIGINT PRIMARY KEY AUTO_INCREMENT,
    revision_id BIGINT NOT NULL,
    tolerance_check LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(tolerance_check)),
    state ENUM('queued', 'running', 'done', 'failed', 'cancelled') NOT NULL DEFAULT 'queued',
    engine VARCHAR(20) NOT NULL,
    points_total INT NOT NULL CHECK (points_total > 0),
    points_done INT NOT NULL DEFAULT 0,
    verdict ENUM('pass', 'fail', 'undecided') NULL,
    digest CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
    error VARCHAR(500) NULL,
    requested_by BIGINT NOT NULL,
    created_at DATETIME(3) NOT NULL,
    started_at DATETIME(3) NULL,
    finished_at DATETIME(3) NULL,
    INDEX (state, id),
    FOREIGN KEY (revision_id) REFERENCES revisions (id),
    FOREIGN KEY (requested_by) REFERENCES people (id),
    CHECK (points_done BETWEEN 0 AND points_total),
    CONSTRAINT done_is_whole CHECK (
      state <> 'done' OR (verdict IS NOT NULL AND digest IS NOT NULL AND finished_at IS NOT NULL AND points_done = points_total)
    )
  )`,
  // sequence: the order in which points were finished, from 1; it numbers the events of the replay.
  `CREATE TABLE IF NOT EXISTS replay_points (
    replay_id BIGINT NOT NULL,
    point_index INT NOT NULL CHECK (point_index >= 0),
    sequence INT NOT NULL CHECK (sequence > 0),
    result LONGTEXT COLLATE utf8mb4_bin NOT NULL CHECK (JSON_VALID(result)),
    PRIMARY KEY (replay_id, point_index),
    UNIQUE (replay_id, sequence),
    FOREIGN KEY (replay_id) REFERENCES replays (id) ON DELETE CASCADE
  )`,
);

export const down = dropTables('replay_points', 'replays');
