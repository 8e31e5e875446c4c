import { escapeIdentifier } from 'pg';
import { expect, test } from 'vitest';
import { CALLERS, type Caller } from './cast';
import { asOwner } from './database';

/** What a route.ts exports for a verb. */
export type Handler = (request: Request, context: { params: Promise<Record<string, string | string[]>> }) => Promise<Response>;

export interface Call {
  /** GET unless said, or POST where there is a body. */
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** The path's parameters, decoded. */
  params?: Record<string, string>;
  query?: Record<string, string>;
  /** Sent as JSON. */
  body?: unknown;
  /** Sent as it is, in place of a JSON body. */
  raw?: BodyInit;
  /** Bearer token; null or nothing sends none. */
  token?: string | null;
  headers?: Record<string, string>;
}

export interface Answer {
  status: number;
  headers: Headers;
  text: string;
  /** The body as JSON; null where it is none. */
  json: Record<string, unknown> | null;
}

const ADDRESS = 'http://127.0.0.1:3000';

/** Calls a route handler in process, as a request of its own, and reads the whole answer. */
export async function call(handler: Handler, { method, params = {}, query = {}, body, raw, token, headers = {} }: Call = {}): Promise<Answer> {
  const url = new URL('/api/v1/test', ADDRESS);
  for (const [name, value] of Object.entries(query)) url.searchParams.set(name, value);
  const sent = new Headers({ host: url.host, ...headers });
  if (token) sent.set('authorization', `Bearer ${token}`);
  if (body !== undefined) sent.set('content-type', 'application/json');
  const payload = raw ?? (body === undefined ? undefined : JSON.stringify(body));
  const request = new Request(url, { method: method ?? (payload === undefined ? 'GET' : 'POST'), headers: sent, body: payload, duplex: 'half' } as RequestInit);
  const response = await handler(request, { params: Promise.resolve(params) });
  const text = await response.text();
  const isJson = /json/.test(response.headers.get('content-type') ?? '');
  return { status: response.status, headers: response.headers, text, json: isJson ? (JSON.parse(text) as Record<string, unknown>) : null };
}

/** The answer is an RFC 9457 problem document with this status and code. Answers it, to look further. */
export function expectProblem(answer: Answer, status: number, code: string, field?: string): Record<string, unknown> {
  expect(answer.headers.get('content-type')).toBe('application/problem+json');
  expect(answer.json).toMatchObject({ type: 'about:blank', status, code });
  expect(answer.status).toBe(status);
  expect(answer.json?.detail).toMatch(/\S/);
  expect(answer.json?.reference).toMatch(/^[0-9a-f-]{36}$/);
  if (field !== undefined) expect(answer.json?.field).toBe(field);
  return answer.json ?? {};
}

/** Every row of these tables, to show that a refused call has left them as they were. */
export async function rowsOf(...tables: string[]): Promise<string> {
  const found: string[] = [];
  for (const table of tables) {
    const rows = await asOwner<{ row: string }>(`select to_jsonb(t)::text as row from ${escapeIdentifier(table)} t order by 1`);
    found.push(`${table}: ${rows.map((one) => one.row).join('\n')}`);
  }
  return found.join('\n\n');
}

/** What each caller is to get from a verb. */
export type StatusOfCaller = Record<Caller, number>;

const CODE_OF: Record<number, string> = { 401: 'not_signed_in', 403: 'forbidden', 404: 'not_found' };

/**
 * One test per caller: the verb answers the status of the table; where that is a refusal, the answer is a problem document
 * and the named tables hold what they held. `prepare` makes what the call needs afresh for each caller, so that one's
 * success cannot hide another's failure.
 */
export function eachCaller(verb: string, handler: Handler, expected: StatusOfCaller, tables: string[], prepare: (caller: Caller) => Promise<Call>): void {
  test.each(CALLERS.map((caller) => [caller, expected[caller]] as const))(`${verb}: %s gets %i`, async (caller, status) => {
    const prepared = await prepare(caller);
    const before = await rowsOf(...tables);
    const answer = await call(handler, prepared);
    if (status in CODE_OF) {
      expectProblem(answer, status, CODE_OF[status]);
      expect(await rowsOf(...tables)).toBe(before);
    } else {
      expect(answer.status, answer.text).toBe(status);
    }
  });
}
