import { vi } from 'vitest';

export interface Answer {
  status?: number;
  body?: unknown;
  etag?: string;
}

export interface SeenCall {
  method: string;
  path: string;
  ifMatch: string | undefined;
  body: unknown;
}

/**
 * Stands in for the network: every call is answered by `answer`, and told.
 *
 * @returns the calls, in their order
 */
export function stubApi(answer: (call: SeenCall) => Answer): SeenCall[] {
  const calls: SeenCall[] = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit) => {
    const headers = new Headers(init.headers);
    const call = {
      method: init.method ?? 'GET',
      path: url.replace('/api/v1', ''),
      ifMatch: headers.get('if-match') ?? undefined,
      body: typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : undefined,
    };
    calls.push(call);
    const { status = 200, body = {}, etag } = answer(call);
    const text = status === 204 ? null : JSON.stringify(body);
    return Promise.resolve(new Response(text, { status, headers: { ...(etag && { etag }) } }));
  });
  return calls;
}
