export const dynamic = 'force-dynamic';

/** The process answers. */
export function GET(): Response {
  return Response.json({ status: 'ok' }, { headers: { 'cache-control': 'no-store' } });
}
