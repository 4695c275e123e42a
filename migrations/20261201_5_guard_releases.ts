import { dropTriggers, refuse, runAll } from './statements';

// The share lock makes whoever adds an entry wait for a freeze that is under way, and then see it.
const ofFrozen = (row: 'OLD' | 'NEW') =>
  `(SELECT state FROM releases WHERE id = ${row}.release_id LOCK IN SHARE MODE) = 'frozen'`;

const reachedByFrozen = `EXISTS (SELECT 1 FROM releases WHERE target_id = OLD.id AND state = 'frozen' LOCK IN SHARE MODE)`;

const frozen = 'A frozen release cannot be changed.';

const guardsOf = (table: string) => [
  refuse(`${table}_insert`, `INSERT ON ${table}`, ofFrozen('NEW'), frozen),
  refuse(`${table}_update`, `UPDATE ON ${table}`, `${ofFrozen('OLD')} OR ${ofFrozen('NEW')}`, frozen),
  refuse(`${table}_delete`, `DELETE ON ${table}`, ofFrozen('OLD'), frozen),
];

export const up = runAll(
  refuse('revisions_update', 'UPDATE ON revisions', 'TRUE', 'A revision cannot be changed.'),
  refuse('revisions_delete', 'DELETE ON revisions', 'TRUE', 'A revision cannot be removed.'),
  refuse('releases_insert', 'INSERT ON releases', `NEW.state <> 'draft'`, 'A release begins as a draft.'),
  refuse('releases_update', 'UPDATE ON releases', `OLD.state = 'frozen'`, frozen),
  refuse('releases_delete', 'DELETE ON releases', `OLD.state = 'frozen'`, 'A frozen release cannot be removed.'),
  ...guardsOf('release_entries'),
  ...guardsOf('release_files'),
  refuse(
    'targets_update',
    'UPDATE ON targets',
    `(NEW.slug <> OLD.slug OR NEW.id <> OLD.id) AND ${reachedByFrozen}`,
    'A frozen release is found by the slug of this target: it cannot be changed.',
  ),
  refuse('targets_delete', 'DELETE ON targets', reachedByFrozen, 'A frozen release belongs to this target.'),
);

export const down = dropTriggers(
  ...['revisions_update', 'revisions_delete', 'releases_insert', 'releases_update', 'releases_delete'],
  ...['insert', 'update', 'delete'].flatMap((event) => [`release_entries_${event}`, `release_files_${event}`]),
  ...['targets_update', 'targets_delete'],
);
