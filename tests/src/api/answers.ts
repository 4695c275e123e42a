import type { Services } from '../../../server/services';
import type { ReplayTrace as Traced } from '../../../shared/replay/trace';
import type { SessionEntry } from '../../../src/api/account';
import type { AuditEntry, Person } from '../../../src/api/people';
import type { PlanSheet, PlanSummary, RevisionSummary } from '../../../src/api/plans';
import type { FileEntry, Release, ReleaseSummary } from '../../../src/api/releases';
import type { CompleteCheck, Replay, ReplaySummary, ReplayTrace } from '../../../src/api/replays';
import type { Revision } from '../../../src/api/revisions';
import type { Hit } from '../../../src/api/search';
import type { TargetDetail, TargetSummary } from '../../../src/api/targets';

/** What a method of a service answers. */
type Answer<S extends keyof Services, M extends keyof Services[S]> = Services[S][M] extends (
  ...args: never[]
) => Promise<infer Result>
  ? Result
  : 'no promise';
type Item<Page> = Page extends { items: (infer Each)[] } ? Each : 'no page';
type Each<List> = List extends (infer Item)[] ? Item : 'no list';

/** Does not compile where the server leaves something out that the browser reads, or answers another type. */
type Reads<Read, Answered extends Read> = [Read, Answered];

/** The server fills defaults in before it keeps a check: its type does not say so. */
type Checked<Answered> = Omit<Answered, 'check'> & { check: CompleteCheck };

/** Every answer that src/api names a type for, beside what the services give. Checked by the compiler alone. */
export type Answers = [
  Reads<PlanSummary, Item<Answer<'plans', 'list'>>>,
  Reads<PlanSheet, Answer<'plans', 'get'>>,
  Reads<RevisionSummary, Item<Answer<'revisions', 'list'>>>,
  Reads<Revision, Answer<'revisions', 'get'>>,
  Reads<FileEntry, Each<Answer<'revisions', 'files'>>>,
  Reads<ReleaseSummary, Item<Answer<'releases', 'list'>>>,
  Reads<Release, Answer<'releases', 'get'>>,
  Reads<ReplaySummary, Checked<Item<Answer<'replays', 'list'>>>>,
  Reads<Replay, Checked<Answer<'replays', 'get'>>>,
  Reads<ReplayTrace, Traced>,
  Reads<Person, Item<Answer<'people', 'list'>>>,
  Reads<AuditEntry, Item<Answer<'people', 'audit'>>>,
  Reads<TargetSummary, Item<Answer<'targets', 'list'>>>,
  Reads<TargetDetail, Answer<'targets', 'get'>>,
  Reads<Hit, Each<Answer<'search', 'find'>>>,
  Reads<SessionEntry, Each<Answer<'sessions', 'list'>>>,
];
