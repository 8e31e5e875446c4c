/** What a caller can act on, with the HTTP status that carries it. Everything else is a bug and answers 500 without detail. */
export const STATUS_OF = {
  bad_input: 422,
  bad_request: 400,
  not_signed_in: 401,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  already_exists: 409,
  frozen: 409,
  precondition_failed: 412,
  too_large: 413,
  wrong_media_type: 415,
  too_many_requests: 429,
  not_available: 503,
  storage_full: 507,
} as const;

export type ErrorCode = keyof typeof STATUS_OF;

/** One failing item of a bulk call: its index in the request, what it names, and what is wrong with it. */
export interface ItemError {
  index: number;
  code: string;
  message: string;
  field?: string;
  asset?: string;
  part?: string;
  /** The row as it is now, where somebody else changed it meanwhile. */
  current?: unknown;
}

export class StudioError extends Error {
  readonly code: ErrorCode;
  readonly field: string | null;
  readonly errors: ItemError[];

  constructor(code: ErrorCode, message: string, options: { field?: string; errors?: ItemError[] } = {}) {
    super(message);
    this.name = 'StudioError';
    this.code = code;
    this.field = options.field ?? null;
    this.errors = options.errors ?? [];
  }

  get status(): number {
    return STATUS_OF[this.code];
  }
}
