import { ApiError } from './errors';
import { send } from './http';

export interface ServerEvent {
  id: string | undefined;
  type: string;
  /** Parsed when it is JSON, else the text. */
  data: unknown;
}

export interface EventOptions {
  signal?: AbortSignal;
  /** Pause before the stream is opened again, doubled up to 16 s; milliseconds. */
  retry?: number;
  /** Called whenever the stream broke, before it is opened again. */
  onLost?: () => void;
}

/**
 * Follows a stream of server-sent events with the bearer token, which the browser's own EventSource cannot send. A
 * broken stream is opened again from the last event that arrived.
 *
 * @param onEvent returns `false` to end the stream
 * @returns when the handler or the signal ended it, or the server had nothing more (204)
 * @throws {ApiError} when the server refuses the stream
 */
export async function events(
  path: string,
  onEvent: (event: ServerEvent) => unknown,
  { signal, retry = 1000, onLost }: EventOptions = {},
): Promise<void> {
  let last: string | undefined;
  for (let pause = retry; !signal?.aborted; pause = Math.min(2 * pause, 16_000)) {
    const ended = await follow(path, last, signal, (event) => {
      last = event.id ?? last;
      pause = retry;
      return onEvent(event);
    });
    if (ended) return;
    onLost?.();
    await wait(pause, signal);
  }
}

type Follow = (event: ServerEvent) => unknown;

/** One connection: true when the stream is over, false when it broke and is worth another try. */
async function follow(path: string, last: string | undefined, signal: AbortSignal | undefined, on: Follow) {
  try {
    const headers = { accept: 'text/event-stream', ...(last !== undefined && { 'last-event-id': last }) };
    const response = await send({ method: 'GET', path, headers, signal, patience: 0 });
    return response.status === 204 || !response.body || (await read(response.body, on));
  } catch (error) {
    if (signal?.aborted) return true;
    if (error instanceof ApiError && error.status > 0 && error.status < 500) throw error;
    return false;
  }
}

async function read(body: ReadableStream<Uint8Array>, on: Follow): Promise<boolean> {
  const reader = body.pipeThrough(new TextDecoderStream() as TransformStream<Uint8Array, string>).getReader();
  let rest = '';
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return false;
    const blocks = (rest + value).split(/\r?\n\r?\n/);
    rest = blocks.pop() ?? '';
    for (const event of blocks.map(parseEvent)) {
      if (event && on(event) === false) {
        await reader.cancel();
        return true;
      }
    }
  }
}

/** A block of a stream; a comment that only keeps the line open is undefined. */
export function parseEvent(block: string): ServerEvent | undefined {
  const fields = block.split(/\r?\n/).map((line) => /^(\w+): ?(.*)$/.exec(line));
  const of = (name: string) => fields.filter((field) => field?.[1] === name).map((field) => field?.[2] ?? '');
  const data = of('data');
  if (data.length === 0) return undefined;
  return { id: of('id').at(-1), type: of('event').at(-1) ?? 'message', data: parsed(data.join('\n')) };
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return text;
  }
}

const wait = (milliseconds: number, signal: AbortSignal | undefined): Promise<void> =>
  new Promise((resolve) => {
    const timer = setTimeout(resolve, milliseconds);
    signal?.addEventListener('abort', () => (clearTimeout(timer), resolve()), { once: true });
  });
