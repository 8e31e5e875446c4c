import { getReadiness } from '@/lib/health/get-readiness';

export const dynamic = 'force-dynamic';

/** The process and all that it stands on can do their work; 503 when something cannot. */
export async function GET(): Promise<Response> {
  const readiness = await getReadiness();
  return Response.json(readiness, {
    status: readiness.status === 'ready' ? 200 : 503,
    headers: { 'cache-control': 'no-store' },
  });
}
