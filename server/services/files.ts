import { configHeader } from '../../shared/files/c-header';
import type { FileInput } from '../../shared/files/file-input';
import { configJson, configYaml } from '../../shared/files/yaml';
import { notFound } from '../errors';
import type { FileEntry, StoredFile } from '../repositories/release-files';
import type { StoredRevision } from '../repositories/revisions';
import { sha256 } from './digest';

export type { StoredFile };

/** What a team takes away of a revision, by file name. */
const makers: Record<string, (input: FileInput) => string> = {
  'config.h': configHeader,
  'config.yaml': configYaml,
  'config.json': configJson,
};

export const fileOf = (name: string, content: string): StoredFile => ({
  name,
  content,
  bytes: Buffer.byteLength(content),
  sha256: sha256(content),
});

export const entryOf = ({ name, bytes, sha256 }: StoredFile): FileEntry => ({ name, bytes, sha256 });

const inputOf = (revision: StoredRevision, release: string | null): FileInput => ({
  product: 'Keepstep',
  engine: revision.engine,
  plan: revision.description,
  planName: revision.description.name,
  revision: revision.number,
  digest: revision.digest,
  release,
  design: revision.design,
  target: revision.target,
});

/**
 * Makes one file of a revision; the same revision gives the same bytes.
 *
 * @param release version of the release that the file belongs to; null outside a release
 */
export function revisionFile(revision: StoredRevision, name: string, release: string | null = null): StoredFile {
  const make = Object.hasOwn(makers, name) ? makers[name] : undefined;
  if (!make) throw notFound('file');
  return fileOf(name, make(inputOf(revision, release)));
}

export const revisionFiles = (revision: StoredRevision): StoredFile[] =>
  Object.keys(makers).map((name) => revisionFile(revision, name));
