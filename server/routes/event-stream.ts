import type { Request, Response } from 'express';
import { invalidAt } from '../errors';
import type { Stream, StreamEvent } from '../services/replay-stream';

/** Proxies close a connection that is silent for longer, ms. */
const heartbeat = 15_000;

/** Place after which the reader takes the stream up again, of the Last-Event-ID header; 0 from the beginning. */
export function lastEventIdOf(req: Request): number {
  const text = req.get('last-event-id') ?? '0';
  if (!/^\d{1,9}$/.test(text)) throw invalidAt('/last-event-id', 'must be the id of an event');
  return Number(text);
}

/** Begins to answer with server-sent events. Headers go out with the first event: a refusal before it is still possible. */
export function eventStream(res: Response, closed: () => void): Stream {
  const beat = setInterval(() => res.headersSent && res.write(': still here\n\n'), heartbeat);
  const finish = () => {
    clearInterval(beat);
    closed();
  };
  res.on('close', finish);
  res.status(200).set({
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-store',
    'X-Accel-Buffering': 'no',
  });
  return {
    send({ id, type, data }: StreamEvent) {
      if (!res.writableEnded) res.write(`id: ${id}\nevent: ${type}\ndata: ${JSON.stringify(data)}\n\n`);
    },
    end() {
      res.end();
    },
  };
}
