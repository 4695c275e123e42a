import type { Request, Response } from 'express';
import type { ReleaseCreate } from '../../shared/model/release-create';
import type { ReleaseEntry } from '../../shared/model/release-entry';
import type { ReleaseFreeze } from '../../shared/model/release-freeze';
import { idOf, nameOf, nameQueryOf, pageOf, personOf, queryOf, versionOf } from '../request';
import type { StoredFile } from '../services/files';
import type { DraftChange } from '../services/release-drafts';
import type { Release, ReleasesService } from '../services/releases';
import { everyone } from '../roles';
import { paging, tagged, type Route } from './route';
import { sendTextFile } from './text-file';

const manager = ['release'] as const;

const changeOf = (req: Request): DraftChange => ({
  id: idOf(req, 'release'),
  version: versionOf(req),
  by: personOf(req),
});

const send = (res: Response, release: Release) => void tagged(res, release.rowVersion).json(release);

/** A frozen file never changes: whoever has it need not ask again. */
const sendFrozen = (req: Request, res: Response, file: StoredFile) =>
  sendTextFile(
    res.set('Cache-Control', 'private, immutable, max-age=31536000'),
    file,
    queryOf(req, 'download') === '1',
  );

export function releasesRoutes(releases: ReleasesService): Route[] {
  return [...listAndCreate(releases), ...ofOne(releases), ...entries(releases), ...frozen(releases)];
}

const listAndCreate = (releases: ReleasesService): Route[] => [
  {
    method: 'get',
    path: '/releases',
    allowed: everyone,
    summary: 'Releases, newest first, of one target when it is given',
    query: ['target', ...paging],
    async handle(req, res) {
      res.json(await releases.list(nameQueryOf(req, 'target'), pageOf(req)));
    },
  },
  {
    method: 'post',
    path: '/releases',
    allowed: manager,
    summary: 'Create a release, a draft without entries',
    body: 'release-create',
    status: 201,
    async handle(req, res) {
      const { target, version } = req.body as ReleaseCreate;
      const release = await releases.create(target, version, personOf(req));
      tagged(res, release.rowVersion).status(201).json(release);
    },
  },
];

const ofOne = (releases: ReleasesService): Route[] => [
  {
    method: 'get',
    path: '/releases/:id',
    allowed: everyone,
    summary: 'A release with its config set',
    async handle(req, res) {
      send(res, await releases.get(idOf(req, 'release')));
    },
  },
  {
    method: 'delete',
    path: '/releases/:id',
    allowed: manager,
    summary: 'Remove a draft',
    ifMatch: true,
    status: 204,
    async handle(req, res) {
      await releases.remove(changeOf(req));
      res.status(204).end();
    },
  },
  {
    method: 'post',
    path: '/releases/:id/freeze',
    allowed: manager,
    summary: 'Make the files of a draft and close it for ever',
    body: 'release-freeze',
    ifMatch: true,
    async handle(req, res) {
      const { version } = req.body as ReleaseFreeze;
      send(res, await releases.freeze(changeOf(req), version));
    },
  },
];

const entries = (releases: ReleasesService): Route[] => [
  {
    method: 'put',
    path: '/releases/:id/entries/:slot',
    allowed: manager,
    summary: 'Put a revision into a slot of a draft',
    body: 'release-entry',
    ifMatch: true,
    async handle(req, res) {
      const { revisionId } = req.body as ReleaseEntry;
      send(res, await releases.putEntry(changeOf(req), nameOf(req, 'slot', 'slot'), revisionId));
    },
  },
  {
    method: 'delete',
    path: '/releases/:id/entries/:slot',
    allowed: manager,
    summary: 'Empty a slot of a draft',
    ifMatch: true,
    async handle(req, res) {
      send(res, await releases.removeEntry(changeOf(req), nameOf(req, 'slot', 'slot')));
    },
  },
];

const frozen = (releases: ReleasesService): Route[] => [
  {
    method: 'get',
    path: '/releases/:id/files/:name',
    allowed: everyone,
    summary: 'One file of a frozen release',
    query: ['download'],
    answers: 'text/plain',
    async handle(req, res) {
      sendFrozen(req, res, await releases.file(idOf(req, 'release'), nameOf(req, 'file', 'name')));
    },
  },
  {
    method: 'get',
    path: '/targets/:slug/releases/:version',
    allowed: everyone,
    summary: 'A release by target and version',
    async handle(req, res) {
      const slug = nameOf(req, 'release', 'slug');
      send(res, await releases.getByVersion(slug, nameOf(req, 'release', 'version')));
    },
  },
  {
    method: 'get',
    path: '/targets/:slug/releases/:version/files/:name',
    allowed: everyone,
    summary: 'One file of a frozen release by target and version: the address for build machines',
    query: ['download'],
    answers: 'text/plain',
    async handle(req, res) {
      const slug = nameOf(req, 'release', 'slug');
      const version = nameOf(req, 'release', 'version');
      sendFrozen(req, res, await releases.fileByVersion(slug, version, nameOf(req, 'file', 'name')));
    },
  },
];
