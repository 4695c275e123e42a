import { errorFrom, noAnswer } from './errors';
import { bearerToken, renewToken } from './token';

const root = '/api/v1';
const patienceSeconds = 10;

export interface Call {
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Starts after /api/v1. */
  path: string;
  /** Sent as JSON, or as it is when `contentType` is given. */
  body?: unknown;
  contentType?: string | undefined;
  /** The version that was read: the server refuses to write over a newer one. */
  ifMatch?: string | undefined;
  headers?: Record<string, string>;
  signal?: AbortSignal | undefined;
  /** Seconds until the call gives up; 0 waits for ever. */
  patience?: number;
}

/**
 * One call with the bearer token. An expired token is renewed once and the call repeated; the caller never notices.
 *
 * @returns an answer that is ok
 * @throws {ApiError} a refusal, or status 0 when there was no answer
 * @throws {DOMException} AbortError when the caller's own signal ended it
 */
export async function send(call: Call): Promise<Response> {
  const used = bearerToken();
  let response = await attempt(call);
  // Without a token nobody was signed in: a refused password is an answer, not an expiry.
  if (response.status === 401 && used !== undefined && (await renewToken(used))) response = await attempt(call);
  if (!response.ok) throw await errorFrom(response);
  return response;
}

async function attempt(call: Call): Promise<Response> {
  const patience = call.patience ?? patienceSeconds;
  try {
    return await fetch(root + call.path, {
      method: call.method,
      headers: headersOf(call),
      credentials: 'same-origin',
      signal: signalOf(call.signal, patience),
      ...(call.body !== undefined && { body: bodyOf(call) }),
    });
  } catch (error) {
    if (call.signal?.aborted) throw error;
    throw noAnswer(error, patience);
  }
}

function headersOf({ body, contentType, ifMatch, headers }: Call): Record<string, string> {
  const token = bearerToken();
  return {
    ...(token && { authorization: `Bearer ${token}` }),
    ...(body !== undefined && { 'content-type': contentType ?? 'application/json' }),
    ...(ifMatch !== undefined && { 'if-match': ifMatch }),
    ...headers,
  };
}

const bodyOf = ({ body, contentType }: Call): BodyInit =>
  contentType === undefined ? JSON.stringify(body) : (body as BodyInit);

function signalOf(signal: AbortSignal | undefined, patience: number): AbortSignal | null {
  const signals = [signal, patience > 0 ? AbortSignal.timeout(patience * 1000) : undefined];
  const given = signals.filter((each) => each !== undefined);
  return given.length === 0 ? null : AbortSignal.any(given);
}
