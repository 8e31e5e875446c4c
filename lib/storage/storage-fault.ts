import { StudioError } from '@/lib/rules/studio-error';

const FULL = new Set(['ENOSPC', 'EDQUOT', 'QuotaExceeded', 'XMinioStorageFull', 'StorageFull', 'InsufficientStorage']);
const PASSING = new Set([
  ...['ECONNREFUSED', 'ECONNRESET', 'ECONNABORTED', 'ETIMEDOUT', 'EPIPE', 'ENOTFOUND', 'EAI_AGAIN', 'EHOSTUNREACH', 'ENETUNREACH', 'ENETDOWN'],
  ...['EIO', 'ESTALE', 'EBUSY', 'EMFILE', 'ENFILE', 'EAGAIN', 'ERR_STREAM_PREMATURE_CLOSE'],
  ...['TimeoutError', 'RequestTimeout', 'RequestTimeoutException', 'SlowDown', 'InternalError', 'ServiceUnavailable', 'OperationAborted', 'IncompleteBody', 'NetworkingError'],
]);
const MISSING = new Set(['ENOENT', 'NoSuchKey', 'NotFound']);

/** An error and what it was caused by, outermost first. */
function* chainOf(error: unknown): Iterable<Error> {
  for (let at = error, depth = 0; at instanceof Error && depth < 8; at = at.cause, depth++) yield at;
}

function wordsOf(error: Error): string[] {
  const code = 'code' in error && typeof error.code === 'string' ? error.code : '';
  const status = '$metadata' in error && error.$metadata !== null && typeof error.$metadata === 'object' && 'httpStatusCode' in error.$metadata ? error.$metadata.httpStatusCode : null;
  return [error.name, code, ...(typeof status === 'number' && (status === 429 || (status >= 500 && status !== 501 && status !== 507)) ? ['ServiceUnavailable'] : status === 507 ? ['InsufficientStorage'] : [])];
}

const holds = (error: unknown, words: ReadonlySet<string>): boolean => [...chainOf(error)].some((one) => wordsOf(one).some((word) => words.has(word)));

/** Whether the storage has no room left. */
export const isFullStorage = (error: unknown): boolean => holds(error, FULL);

/** Whether the storage says that there is nothing under a key. */
export const isMissingInStorage = (error: unknown): boolean => holds(error, MISSING);

/** Whether a fault of the storage passes by itself (not reached, overloaded, broken off), so that the same can be tried again later. */
export const isTransientStorageFault = (error: unknown): boolean => holds(error, PASSING) && !isFullStorage(error);

/** What a caller can act on of a fault of the storage: it is full, or has to be tried again; every other error as it was. */
export function asStudioError(error: unknown): unknown {
  if (error instanceof StudioError) return error;
  if (isFullStorage(error)) return new StudioError('storage_full', 'The studio’s storage is full. Nothing of this file was kept. Tell an admin.');
  if (isTransientStorageFault(error)) return new StudioError('not_available', 'The studio’s storage cannot be reached right now. Try again in a moment.');
  return error;
}
