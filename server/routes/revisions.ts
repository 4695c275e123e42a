import type { RevisionCreate } from '../../shared/model/revision-create';
import { idOf, nameOf, pageOf, personOf, queryOf, versionOf } from '../request';
import type { RevisionsService, Save } from '../services/revisions';
import { everyone } from '../roles';
import { paging, type Route } from './route';
import { sendTextFile } from './text-file';

export function revisionsRoutes(revisions: RevisionsService): Route[] {
  return [
    {
      method: 'get',
      path: '/plans/:id/revisions',
      allowed: everyone,
      summary: 'Revisions of a plan, newest first',
      query: paging,
      async handle(req, res) {
        res.json(await revisions.list(idOf(req, 'plan'), pageOf(req)));
      },
    },
    {
      method: 'post',
      path: '/plans/:id/revisions',
      allowed: ['engineer'],
      summary: 'Save a plan as its next revision',
      body: 'revision-create',
      faultsWithin: 'plan',
      ifMatch: true,
      status: 201,
      async handle(req, res) {
        const save = req.body as RevisionCreate as Save;
        res.status(201).json(await revisions.save(idOf(req, 'plan'), versionOf(req), save, personOf(req)));
      },
    },
    {
      method: 'get',
      path: '/revisions/:id',
      allowed: everyone,
      summary: 'A revision with its design',
      async handle(req, res) {
        res.json(await revisions.get(idOf(req, 'revision')));
      },
    },
    {
      method: 'get',
      path: '/revisions/:id/files',
      allowed: everyone,
      summary: 'Files of a revision',
      async handle(req, res) {
        res.json({ items: await revisions.files(idOf(req, 'revision')), next: null });
      },
    },
    {
      method: 'get',
      path: '/revisions/:id/files/:name',
      allowed: everyone,
      summary: 'One file of a revision: config.h, config.yaml or config.json',
      query: ['download'],
      answers: 'text/plain',
      async handle(req, res) {
        const file = await revisions.file(idOf(req, 'revision'), nameOf(req, 'file', 'name'));
        sendTextFile(res.set('Cache-Control', 'private, no-cache'), file, queryOf(req, 'download') === '1');
      },
    },
  ];
}
