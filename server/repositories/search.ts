import type { Knex } from 'knex';
import { likeText } from './columns';

export interface SearchRow {
  kind: 'plan' | 'target' | 'release' | 'replay';
  /** What finds it again: the slug of a target, the id of everything else. */
  key: string;
  label: string;
}

export function searchRepository(db: Knex) {
  return {
    /** At most `limit` of each kind whose names hold the text, in any case of letters. */
    async find(text: string, limit: number): Promise<SearchRow[]> {
      const like = likeText(text);
      const [rows] = (await db.raw(
        `(SELECT 'target' AS kind, slug AS \`key\`, name AS label FROM targets
           WHERE name LIKE :like OR CONVERT(slug USING utf8mb4) LIKE LOWER(:like) ORDER BY name LIMIT :limit)
         UNION ALL
         (SELECT 'plan', plans.id, CONCAT(plans.name, ', ', targets.name) FROM plans
           JOIN targets ON targets.id = plans.target_id
           WHERE plans.name LIKE :like ORDER BY plans.name LIMIT :limit)
         UNION ALL
         (SELECT 'release', releases.id, CONCAT(targets.name, ' ', releases.version) FROM releases
           JOIN targets ON targets.id = releases.target_id
           WHERE CONCAT(targets.name, ' ', releases.version) LIKE :like ORDER BY releases.id DESC LIMIT :limit)
         UNION ALL
         (SELECT 'replay', replays.id,
             CONCAT('Replay ', replays.id, ', ', JSON_VALUE(tolerance_check, '$.name'), ', ', plans.name) FROM replays
           JOIN revisions ON revisions.id = replays.revision_id JOIN plans ON plans.id = revisions.plan_id
           WHERE CONCAT('Replay ', replays.id) LIKE :like OR JSON_VALUE(tolerance_check, '$.name') LIKE :like
           ORDER BY replays.id DESC LIMIT :limit)`,
        { like, limit },
      )) as [SearchRow[]];
      return rows.map(({ kind, key, label }) => ({ kind, key: String(key), label }));
    },
  };
}
