import type { Response } from 'express';
import type { StoredFile } from '../services/files';

const mediaTypes: Record<string, string> = {
  h: 'text/x-c; charset=utf-8',
  yaml: 'application/yaml; charset=utf-8',
  json: 'application/json; charset=utf-8',
};

/**
 * Sends a file that belongs to a revision or release, its SHA-256 as its tag.
 *
 * @param download the browser is to save it under its name instead of showing it
 */
export function sendTextFile(res: Response, { name, content, sha256 }: StoredFile, download: boolean): void {
  const type = mediaTypes[name.split('.').at(-1)!] ?? 'text/plain; charset=utf-8';
  res.set({ 'Content-Type': type, ETag: `"${sha256}"` });
  if (download) res.attachment(name).set('Content-Type', type);
  if (res.req.fresh) res.status(304).end();
  else res.end(content);
}
