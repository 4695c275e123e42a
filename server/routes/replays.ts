import type { ReplayCreate } from '../../shared/model/replay-create';
import { invalidAt } from '../errors';
import { countOf, idOf, pageOf, personOf } from '../request';
import type { ReplayStreamsService } from '../services/replay-stream';
import type { ReplaysService } from '../services/replays';
import { eventStream, lastEventIdOf } from './event-stream';
import { everyone } from '../roles';
import { paging, type Route } from './route';

const testers = ['engineer', 'tester'] as const;

export function replaysRoutes(replays: ReplaysService, streams: ReplayStreamsService): Route[] {
  return [...listAndCreate(replays), ...ofOne(replays), ...watching(replays, streams)];
}

const listAndCreate = (replays: ReplaysService): Route[] => [
  {
    method: 'get',
    path: '/replays',
    allowed: everyone,
    summary: 'Replays, newest first, of one revision when it is given',
    query: ['revisionId', ...paging],
    async handle(req, res) {
      res.json(await replays.list(countOf(req, 'revisionId'), pageOf(req)));
    },
  },
  {
    method: 'post',
    path: '/replays',
    allowed: testers,
    summary: 'Queue a tolerance check of a revision',
    body: 'replay-create',
    faultsWithin: 'check',
    status: 202,
    async handle(req, res) {
      res.status(202).json(await replays.create(req.body as ReplayCreate, personOf(req)));
    },
  },
];

const ofOne = (replays: ReplaysService): Route[] => [
  {
    method: 'get',
    path: '/replays/:id',
    allowed: everyone,
    summary: 'A replay with its finished points',
    async handle(req, res) {
      res.json(await replays.get(idOf(req, 'replay')));
    },
  },
  {
    method: 'delete',
    path: '/replays/:id',
    allowed: testers,
    summary: 'Remove a replay of one’s own that was not begun',
    status: 204,
    async handle(req, res) {
      await replays.remove(idOf(req, 'replay'), personOf(req));
      res.status(204).end();
    },
  },
  {
    method: 'post',
    path: '/replays/:id/cancel',
    allowed: testers,
    summary: 'Stop a replay; its finished points stay',
    async handle(req, res) {
      res.json(await replays.cancel(idOf(req, 'replay'), personOf(req)));
    },
  },
];

const watching = (replays: ReplaysService, streams: ReplayStreamsService): Route[] => [
  {
    method: 'get',
    path: '/replays/:id/events',
    allowed: everyone,
    summary: 'Points and states of a replay as they come, as server-sent events; Last-Event-ID resumes',
    answers: 'text/event-stream',
    async handle(req, res) {
      let stop = () => {};
      const stream = eventStream(res, () => stop());
      stop = await streams.follow(idOf(req, 'replay'), lastEventIdOf(req), stream);
      if (res.closed || res.writableEnded) stop();
    },
  },
  {
    method: 'get',
    path: '/replays/:id/trace',
    allowed: everyone,
    summary: 'One trial, worked out again from its seed',
    query: ['point', 'trial'],
    async handle(req, res) {
      const id = idOf(req, 'replay');
      const point = countOf(req, 'point');
      const trial = countOf(req, 'trial');
      if (point === undefined) throw invalidAt('/point', 'is missing');
      if (trial === undefined) throw invalidAt('/trial', 'is missing');
      res.json(await replays.trace(id, point, trial));
    },
  },
];
