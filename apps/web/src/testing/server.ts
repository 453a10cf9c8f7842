import { vi } from 'vitest';

export interface Answer {
  status?: number;
  body?: unknown;
  headers?: Record<string, string>;
}
export interface SeenRequest {
  method: string;
  path: string;
  headers: Headers;
  body: unknown;
}
type Handler = Answer | ((request: SeenRequest) => Answer | Promise<Answer>);

/**
 * Answers in place of the server, at the boundary: `fetch`. Keys are `'GET /calls'`, without `/api/v1` and query; the
 * answer to a key may change during a test. A request without an answer fails as an unreachable server does.
 * Returns the handlers, to change them, and every request seen.
 */
export function answerWith(handlers: Record<string, Handler>): {
  handlers: Record<string, Handler>;
  seen: SeenRequest[];
} {
  const seen: SeenRequest[] = [];
  vi.stubGlobal('fetch', async (input: string | URL | Request, init: RequestInit = {}) => {
    const url = new URL(input instanceof Request ? input.url : input, 'http://faintward.test');
    const request: SeenRequest = {
      method: init.method ?? 'GET',
      path: url.pathname.replace(/^\/api\/v1/, '') + url.search,
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? JSON.parse(init.body) : init.body,
    };
    seen.push(request);
    const handler = handlers[`${request.method} ${url.pathname.replace(/^\/api\/v1/, '')}`];
    if (!handler) throw new TypeError(`No answer for ${request.method} ${request.path}`);
    const answer = typeof handler === 'function' ? await handler(request) : handler;
    const status = answer.status ?? 200;
    return new Response(answer.body === undefined ? null : JSON.stringify(answer.body), {
      status,
      headers: { 'Content-Type': status >= 400 ? 'application/problem+json' : 'application/json', ...answer.headers },
    });
  });
  return { handlers, seen };
}

/** A problem as the server answers it. */
export function problem(status: number, code: string, extra: Record<string, unknown> = {}): Answer {
  return { status, body: { type: 'about:blank', title: code, detail: `Detail of ${code}.`, status, code, ...extra } };
}
