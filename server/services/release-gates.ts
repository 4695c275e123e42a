import type { EntryRecord } from '../repositories/release-entries';
import type { ReleaseRecord } from '../repositories/releases';
import type { RevisionRecord } from '../repositories/revisions';

/** One condition of a freeze. */
export interface Gate {
  state: 'open' | 'shut';
  text: string;
  /** Path in the application where a shut gate is mended. */
  link?: string;
}

type Release = Pick<ReleaseRecord, 'targetId' | 'target'>;

export interface GatedEntry extends Pick<EntryRecord, 'slot' | 'plan' | 'targetId'> {
  revision: Pick<RevisionRecord, 'counts' | 'number'>;
}

const named = ({ slot, revision }: GatedEntry): string => `${slot} r${revision.number}`;

const shut = (text: string, entry?: GatedEntry): Gate =>
  entry ? { state: 'shut', text, link: `/plans/${entry.plan.id}` } : { state: 'shut', text };

const orOpen = (gates: Gate[], text: string): Gate[] => (gates.length > 0 ? gates : [{ state: 'open', text }]);

function findingGates(entries: readonly GatedEntry[]): Gate[] {
  const failing = entries.filter(({ revision }) => revision.counts.fail > 0);
  const gates = failing.map((entry) => {
    const { fail } = entry.revision.counts;
    return shut(`${named(entry)} has ${fail} failing ${fail === 1 ? 'finding' : 'findings'}.`, entry);
  });
  return orOpen(gates, 'No entry has a failing finding.');
}

function targetGates({ targetId, target }: Release, entries: readonly GatedEntry[]): Gate[] {
  const strange = entries.filter((entry) => entry.targetId !== targetId);
  const gates = strange.map((entry) =>
    shut(`${named(entry)} was saved for another target than ${target.name}.`, entry),
  );
  return orOpen(gates, `Every entry was saved for ${target.name}.`);
}

/** Everything that must hold before a release can be frozen; gates of one kind stand together. */
export function gatesOf(release: Release, entries: readonly GatedEntry[]): Gate[] {
  if (entries.length === 0) return [shut('The config set has no entry.')];
  return [
    { state: 'open', text: `The config set has ${entries.length} ${entries.length === 1 ? 'entry' : 'entries'}.` },
    ...findingGates(entries),
    ...targetGates(release, entries),
  ];
}
