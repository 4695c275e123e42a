import type { Knex } from 'knex';

/** A file by name, with its size and SHA-256 (hex) in UTF-8. */
export interface FileEntry {
  name: string;
  bytes: number;
  sha256: string;
}

export type StoredFile = FileEntry & { content: string };

export function releaseFilesRepository(db: Knex) {
  const files = () => db<StoredFile & { release_id: number }>('release_files');
  return {
    async list(releaseId: number): Promise<FileEntry[]> {
      return files().where({ release_id: releaseId }).orderBy('name').select('name', 'bytes', 'sha256');
    },
    async find(releaseId: number, name: string): Promise<StoredFile | undefined> {
      return files().where({ release_id: releaseId, name }).first('name', 'bytes', 'sha256', 'content');
    },
    async insert(releaseId: number, stored: readonly StoredFile[]): Promise<void> {
      await files().insert(stored.map((file) => ({ ...file, release_id: releaseId })));
    },
  };
}
