import type { Release } from '../../api/releases';
import { dateText, digestText } from '../../date-text';
import { releaseStateText } from './release-words';

interface Cell {
  label: string;
  value: string;
  mono?: boolean;
}

/** The strip under the title of a release. */
export function releaseCells(release: Release): Cell[] {
  const entries = release.entries.length;
  return [
    { label: 'State', value: releaseStateText(release.state) },
    { label: 'Entries', value: release.state === 'draft' ? String(entries) : `${entries}, fixed` },
    { label: 'Made', value: `${dateText(release.createdAt)}, ${release.createdBy.name}` },
    ...(release.frozenAt
      ? [{ label: 'Frozen', value: `${dateText(release.frozenAt)}, ${release.frozenBy?.name ?? ''}` }]
      : []),
    ...(release.digest ? [{ label: 'Digest', value: digestText(release.digest), mono: true }] : []),
  ];
}

/** Why a person cannot change the config set; undefined when they can. */
export function readOnlyReason(release: Release, manages: boolean): string | undefined {
  if (release.state !== 'draft') return `fixed: the release is ${releaseStateText(release.state)}`;
  return manages ? undefined : 'release managers change it';
}

export function stationNotes(release: Release): Partial<Record<Release['state'], string>> {
  const entries = release.entries.length;
  const shut = release.gates.filter(({ state }) => state === 'shut').length;
  return {
    draft: `${dateText(release.createdAt)}, ${entries === 1 ? '1 entry' : `${entries} entries`}`,
    'in-review': release.state === 'draft' ? 'not in this version' : 'skipped',
    frozen: release.frozenAt
      ? `${dateText(release.frozenAt)}, ${release.files.length} files`
      : `${shut === 0 ? 'no gate' : shut === 1 ? '1 gate' : `${shut} gates`} shut`,
    withdrawn: 'not in this version',
  };
}
