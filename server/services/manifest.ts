import type { FileEntry, StoredFile } from '../repositories/release-files';
import type { StoredRevision } from '../repositories/revisions';
import { canonicalJson } from './digest';
import { entryOf, fileOf, revisionFile } from './files';

/** A slot of a config set with the revision that fills it. */
export interface FilledSlot {
  slot: string;
  revision: StoredRevision;
}

export interface ManifestInput {
  target: { slug: string; name: string };
  version: string;
  entries: readonly FilledSlot[];
}

const perEntry = ['config.h', 'config.yaml'];

function entryFiles({ slot, revision }: FilledSlot, version: string): StoredFile[] {
  return perEntry.map((name) => fileOf(`${slot}.${name}`, revisionFile(revision, name, version).content));
}

const described = ({ slot, revision }: FilledSlot) => ({
  slot,
  plan: revision.description.name,
  revision: revision.number,
  digest: revision.digest,
  engine: revision.engine,
});

function manifest({ target, version, entries }: ManifestInput, files: readonly FileEntry[]): string {
  const content = { product: 'Keepstep', target, version, entries: entries.map(described), files };
  // Canonical JSON, parsed and set again: the order of keys is fixed, and people can read it.
  return `${JSON.stringify(JSON.parse(canonicalJson(content)), null, 2)}\n`;
}

/** Every file of a frozen release, the manifest last; the same entries give the same bytes. */
export function releaseFiles(input: ManifestInput): StoredFile[] {
  const files = input.entries.flatMap((entry) => entryFiles(entry, input.version));
  return [...files, fileOf('manifest.json', manifest(input, files.map(entryOf)))];
}
