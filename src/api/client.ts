import { send, type Call } from './http';

export { ApiError, type Fault } from './errors';
export { events, type ServerEvent } from './events';
export { saveFile } from './save-file';

export type CallOptions = Pick<Call, 'signal' | 'ifMatch' | 'contentType' | 'patience'>;

export interface Tagged<T> {
  body: T;
  /** Give it back as `ifMatch` to write over exactly this version. */
  etag: string | undefined;
}

/** Every call resolves to the body of an ok answer and rejects with an ApiError. Paths start after /api/v1. */
export const api = {
  get: <T>(path: string, options?: CallOptions) => json<T>({ method: 'GET', path, ...options }),
  post: <T = void>(path: string, body?: unknown, options?: CallOptions) =>
    json<T>({ method: 'POST', path, body, ...options }),
  put: <T = void>(path: string, body: unknown, options?: CallOptions) =>
    json<T>({ method: 'PUT', path, body, ...options }),
  patch: <T = void>(path: string, body: unknown, options?: CallOptions) =>
    json<T>({ method: 'PATCH', path, body, ...options }),
  delete: <T = void>(path: string, options?: CallOptions) => json<T>({ method: 'DELETE', path, ...options }),
  text: async (path: string, options?: CallOptions) => (await send({ method: 'GET', path, ...options })).text(),
  blob: async (path: string, options?: CallOptions) => (await send({ method: 'GET', path, ...options })).blob(),

  /** The same, with the entity tag of the answer. */
  tagged: {
    get: <T>(path: string, options?: CallOptions) => tagged<T>({ method: 'GET', path, ...options }),
    post: <T>(path: string, body?: unknown, options?: CallOptions) =>
      tagged<T>({ method: 'POST', path, body, ...options }),
    put: <T>(path: string, body: unknown, options?: CallOptions) =>
      tagged<T>({ method: 'PUT', path, body, ...options }),
    patch: <T>(path: string, body: unknown, options?: CallOptions) =>
      tagged<T>({ method: 'PATCH', path, body, ...options }),
  },
};

const json = async <T>(call: Call): Promise<T> => bodyOf<T>(await send(call));

async function tagged<T>(call: Call): Promise<Tagged<T>> {
  const response = await send(call);
  return { body: await bodyOf<T>(response), etag: response.headers.get('etag') ?? undefined };
}

async function bodyOf<T>(response: Response): Promise<T> {
  const text = await response.text();
  return (text === '' ? undefined : JSON.parse(text)) as T;
}
