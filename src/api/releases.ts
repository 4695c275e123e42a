import { api, type Tagged } from './client';
import { everyPage } from './pages';
import type { PersonName, RevisionSummary } from './plans';

export type ReleaseState = 'draft' | 'in-review' | 'frozen' | 'withdrawn';

export interface ReleaseSummary {
  id: number;
  target: { slug: string; name: string };
  version: string;
  state: ReleaseState;
  entryCount: number;
  createdAt: string;
  createdBy: PersonName;
  frozenAt: string | null;
  frozenBy: PersonName | null;
  /** SHA-256 of manifest.json, hex; null until frozen. */
  digest: string | null;
  rowVersion: number;
}

export interface ReleaseEntry {
  slot: string;
  plan: { id: number; name: string };
  revision: RevisionSummary;
  /** Number of a newer revision of the same plan; null where there is none. */
  newer: number | null;
}

export interface ReleaseGate {
  state: 'open' | 'shut';
  text: string;
  link?: string;
}

export interface FileEntry {
  name: string;
  bytes: number;
  sha256: string;
}

export interface Release extends ReleaseSummary {
  entries: ReleaseEntry[];
  gates: ReleaseGate[];
  files: FileEntry[];
}

/** A release and the tag that a change of it must carry. */
export type TaggedRelease = Tagged<Release>;

const at = (id: number): string => `/releases/${id}`;
const slotAt = (id: number, slot: string): string => `${at(id)}/entries/${encodeURIComponent(slot)}`;

export const listReleases = (): Promise<ReleaseSummary[]> => everyPage<ReleaseSummary>('/releases');

export const createRelease = (target: string, version: string): Promise<Release> =>
  api.post<Release>('/releases', { target, version });

export const getRelease = (id: number): Promise<TaggedRelease> => api.tagged.get<Release>(at(id));

/** Puts a revision into a slot of a draft, in place of what was there. Rejects with 412 when somebody changed it first. */
export const putEntry = (release: TaggedRelease, slot: string, revisionId: number): Promise<unknown> =>
  api.put(slotAt(release.body.id, slot), { revisionId }, { ifMatch: release.etag });

export const removeEntry = (release: TaggedRelease, slot: string): Promise<unknown> =>
  api.delete(slotAt(release.body.id, slot), { ifMatch: release.etag });

export const removeRelease = (release: TaggedRelease): Promise<unknown> =>
  api.delete(at(release.body.id), { ifMatch: release.etag });

/** @param version the release's version as the person typed it; the server compares it */
export const freezeRelease = (release: TaggedRelease, version: string): Promise<unknown> =>
  api.post(`${at(release.body.id)}/freeze`, { version }, { ifMatch: release.etag });

/** Path of a file below /api/v1 by target and version: the address that build machines use. */
export const releaseFilePath = (release: ReleaseSummary, name: string): string =>
  `/targets/${release.target.slug}/releases/${release.version}/files/${encodeURIComponent(name)}`;

export const releaseFileText = (release: ReleaseSummary, name: string): Promise<string> =>
  api.text(releaseFilePath(release, name));
