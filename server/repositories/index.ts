import type { Knex } from 'knex';
import { auditRepository } from './audit';
import { draftsRepository } from './drafts';
import { passwordLinksRepository } from './password-links';
import { peopleRepository } from './people';
import { plansRepository } from './plans';
import { releaseEntriesRepository } from './release-entries';
import { releaseFilesRepository } from './release-files';
import { releasesRepository } from './releases';
import { replayPointsRepository } from './replay-points';
import { replaysRepository } from './replays';
import { revisionsRepository } from './revisions';
import { searchRepository } from './search';
import { sessionsRepository } from './sessions';
import { targetsRepository } from './targets';

/** All repositories over one pool or one transaction. */
export const repositories = (db: Knex) => ({
  audit: auditRepository(db),
  drafts: draftsRepository(db),
  passwordLinks: passwordLinksRepository(db),
  people: peopleRepository(db),
  plans: plansRepository(db),
  releaseEntries: releaseEntriesRepository(db),
  releaseFiles: releaseFilesRepository(db),
  releases: releasesRepository(db),
  replayPoints: replayPointsRepository(db),
  replays: replaysRepository(db),
  revisions: revisionsRepository(db),
  search: searchRepository(db),
  sessions: sessionsRepository(db),
  targets: targetsRepository(db),
});

export type Repositories = ReturnType<typeof repositories>;
