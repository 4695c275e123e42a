import type { PersonChange } from '../../shared/model/person-change';
import type { PersonInvite } from '../../shared/model/person-invite';
import { idOf, pageOf, personOf, versionOf } from '../request';
import type { PeopleService } from '../services/people';
import { paging, tagged, type Route } from './route';

const admin = ['admin'] as const;

export function peopleRoutes(people: PeopleService): Route[] {
  return [
    {
      method: 'get',
      path: '/people',
      allowed: admin,
      summary: 'Everybody who was invited',
      query: paging,
      async handle(req, res) {
        res.json(await people.list(pageOf(req)));
      },
    },
    {
      method: 'post',
      path: '/people',
      allowed: admin,
      summary: 'Invite a person; the one-time link is shown once',
      body: 'person-invite',
      status: 201,
      async handle(req, res) {
        res.status(201).json(await people.invite(req.body as PersonInvite, personOf(req).id));
      },
    },
    {
      method: 'patch',
      path: '/people/:id',
      allowed: admin,
      summary: 'Change name, role or access',
      body: 'person-change',
      ifMatch: true,
      async handle(req, res) {
        const change = req.body as PersonChange;
        const person = await people.change(idOf(req, 'person'), versionOf(req), change, personOf(req).id);
        tagged(res, person.version).json(person);
      },
    },
    {
      method: 'post',
      path: '/people/:id/links',
      allowed: admin,
      summary: 'A new one-time link; older ones stop working',
      status: 201,
      async handle(req, res) {
        res.status(201).json(await people.newLink(idOf(req, 'person'), personOf(req).id));
      },
    },
    {
      method: 'get',
      path: '/audit',
      allowed: admin,
      summary: 'Who did what, newest first',
      query: paging,
      async handle(req, res) {
        res.json(await people.audit(pageOf(req)));
      },
    },
  ];
}
