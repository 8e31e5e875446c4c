import { log } from '@/lib/log';
import { StudioError } from '@/lib/rules/studio-error';

/** An RFC 9457 problem document. What is not a StudioError is logged with the reference and shown without detail. */
export function problemResponse(error: unknown, reference: string, request: Request): Response {
  const known = error instanceof StudioError ? error : null;
  if (!known) log.error({ err: error, reference, method: request.method, path: new URL(request.url).pathname }, 'request failed');
  const status = known?.status ?? 500;
  const body = {
    type: 'about:blank',
    title: known ? known.code.replaceAll('_', ' ') : 'internal error',
    status,
    detail: known?.message ?? `Something broke on our side. Reference ${reference}.`,
    code: known?.code ?? 'internal',
    field: known?.field ?? null,
    reference,
    ...(known && known.errors.length > 0 ? { errors: known.errors } : {}),
  };
  return new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store' },
  });
}
