import { randomUUID } from 'node:crypto';
import { headers } from 'next/headers';
import type { ZodType } from 'zod';
import { database } from '@/db/client';
import { findActor, findSessionActor } from '@/lib/auth/find-actor';
import type { Context } from '@/lib/context';
import { answerOnce } from '@/lib/http/answer-once';
import { jsonAnswer } from '@/lib/http/json-answer';
import { problemResponse } from '@/lib/http/problem-response';
import { readInput } from '@/lib/http/read-input';
import { refuseForeignOrigin } from '@/lib/http/refuse-foreign-origin';
import { log } from '@/lib/log';
import type { ActionResult } from '@/lib/rules/action-result';
import { parseInput } from '@/lib/rules/parse-input';
import { StudioError } from '@/lib/rules/studio-error';

/** A verb of the product: parsed input in, plain data (or a Response of its own, for downloads) out. */
export type Verb<Input, Output> = (context: Context, input: Input) => Promise<Output>;

type RouteContext = { params: Promise<Record<string, string | string[]>> };

export interface RouteOptions {
  /** Status of a plain answer; 200 unless said. */
  status?: 200 | 201 | 202 | 204;
  /** The verb reads the request's body itself (uploads): the input is made of path and query alone. */
  rawBody?: boolean;
}

/**
 * The plumbing of a route handler: recognises the caller, parses path, query and JSON body as one input, runs the verb,
 * and answers JSON or an RFC 9457 problem document. Writes under a session must come from our own pages; writes that carry
 * an Idempotency-Key are answered once.
 */
export function route<Input, Output>(
  schema: ZodType<Input>,
  verb: (context: Context, input: Input, request: Request) => Promise<Output>,
  options: RouteOptions = {},
) {
  return async (request: Request, { params }: RouteContext): Promise<Response> => {
    const requestId = randomUUID();
    try {
      const actor = await findActor(database(), request.headers);
      const isWrite = request.method !== 'GET' && request.method !== 'HEAD';
      if (isWrite && actor?.via !== 'token') refuseForeignOrigin(request);
      const context: Context = { db: database(), actor, origin: actor?.via === 'token' ? 'api' : 'hand', requestId };
      const run = async (body: unknown) => {
        const input = parseInput(schema, body);
        return jsonAnswer(await verb(context, input, request), options.status ?? 200);
      };
      const raw = await readInput(request, await params, options.rawBody === true);
      const key = request.headers.get('idempotency-key');
      if (isWrite && key && actor) return await answerOnce(context.db, actor.userId, key, request, raw, () => run(raw));
      return await run(raw);
    } catch (error) {
      return problemResponse(error, requestId, request);
    }
  };
}

/** The plumbing of a server action: the same verb, for a form of ours. Never throws to the page, but for Next's own signals. */
export function action<Input, Output>(schema: ZodType<Input>, verb: Verb<Input, Output>) {
  return async (input: unknown): Promise<ActionResult<Output>> => {
    const requestId = randomUUID();
    try {
      const actor = await findSessionActor(database(), await headers());
      const context: Context = { db: database(), actor, origin: 'hand', requestId };
      return { ok: true, data: await verb(context, parseInput(schema, input)) };
    } catch (error) {
      if (error instanceof StudioError) {
        return { ok: false, code: error.code, message: error.message, field: error.field, errors: error.errors };
      }
      if (error instanceof Error && 'digest' in error) throw error;
      log.error({ err: error, requestId }, 'action failed');
      return { ok: false, code: 'internal', message: `Something broke on our side. Reference ${requestId}.`, field: null, errors: [] };
    }
  };
}
