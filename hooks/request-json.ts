import type { ItemError } from '@/lib/rules/studio-error';

/** A refusal of the server, read from its problem document (RFC 9457). `status` is 0 when the server was not reached. */
export class RequestError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly field: string | null = null,
    readonly errors: ItemError[] = [],
  ) {
    super(message);
    this.name = 'RequestError';
  }

  get isConflict(): boolean {
    return this.status === 409 || this.status === 412;
  }
}

interface ProblemDocument {
  title?: string;
  detail?: string;
  code?: string;
  field?: string | null;
  errors?: ItemError[];
}

/** Calls our own API under the signed-in session. Throws RequestError for every answer that is no success. */
export async function requestJson<Answer>(
  path: string,
  init: { method?: string; body?: unknown; signal?: AbortSignal } = {},
): Promise<Answer> {
  let response: Response;
  try {
    response = await fetch(path, {
      method: init.method ?? 'GET',
      headers:
        init.body === undefined
          ? { accept: 'application/json' }
          : { accept: 'application/json', 'content-type': 'application/json' },
      body: init.body === undefined ? undefined : JSON.stringify(init.body),
      signal: init.signal,
    });
  } catch (error) {
    if (init.signal?.aborted) throw error;
    throw new RequestError(0, 'not_reached', 'The server was not reached.');
  }
  if (response.ok) return (response.status === 204 ? null : await response.json()) as Answer;
  const problem = await readProblem(response);
  throw new RequestError(
    response.status,
    problem.code ?? 'internal',
    problem.detail ?? problem.title ?? 'The server refused this.',
    problem.field ?? null,
    problem.errors ?? [],
  );
}

async function readProblem(response: Response): Promise<ProblemDocument> {
  try {
    return (await response.json()) as ProblemDocument;
  } catch {
    return {};
  }
}
