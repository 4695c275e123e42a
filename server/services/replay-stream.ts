import type { Knex } from 'knex';
import { notFound } from '../errors';
import type { ReplayEvent, ReplayEvents, ReplayListener } from '../replay-queue/replay-events';
import type { ReplaySummary } from '../repositories/replay-rows';
import { repositories } from '../repositories/index';

/** An event of a stream; `id` is what Last-Event-ID names when the stream is taken up again. */
export interface StreamEvent {
  id: number;
  type: 'state' | 'point';
  data: object;
}

export interface Stream {
  send(event: StreamEvent): void;
  end(): void;
}

const hasEnded = ({ state }: ReplaySummary): boolean => state !== 'queued' && state !== 'running';

/** Writes events to a stream in order and each point once. */
function writerOf(stream: Stream, after: number): ReplayListener {
  let last = after;
  return (event) => {
    if (event.type === 'end') return stream.end();
    if (event.type === 'state') {
      stream.send({ id: last, type: 'state', data: event.replay });
      if (hasEnded(event.replay)) stream.end();
    } else if (event.sequence > last) {
      last = event.sequence;
      stream.send({ id: last, type: 'point', data: event.point });
    }
  };
}

export function replayStreamsService(db: Knex, events: ReplayEvents) {
  const { replayPoints, replays } = repositories(db);

  /** Writes what is stored. @returns the writer, for what comes */
  async function catchUp(id: number, after: number, stream: Stream): Promise<ReplayListener> {
    const replay = await replays.find(id);
    if (!replay) throw notFound('replay');
    const from = Math.min(after, replay.pointsDone); // fewer than the reader has: a new engine began again
    const write = writerOf(stream, from);
    for (const stored of await replayPoints.list(id, from)) write({ type: 'point', ...stored });
    write({ type: 'state', replay });
    return write;
  }

  return {
    /**
     * Streams a replay: the stored points after `after`, its state, then what happens to it, until it ends.
     *
     * @param after place of the last point that the reader has
     * @returns stops listening
     */
    async follow(id: number, after: number, stream: Stream): Promise<() => void> {
      const waiting: ReplayEvent[] = [];
      let listener: ReplayListener = (event) => void waiting.push(event);
      // Listening begins before reading: nothing that happens in between is lost, and the writer drops what comes twice.
      const stop = events.subscribe(id, (event) => listener(event));
      try {
        const write = await catchUp(id, after, stream);
        waiting.forEach(write);
        listener = write;
      } catch (error) {
        stop();
        throw error;
      }
      return stop;
    },
  };
}

export type ReplayStreamsService = ReturnType<typeof replayStreamsService>;
