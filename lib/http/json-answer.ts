/** Plain data as a JSON answer that no cache keeps; a Response passes as it is. */
export function jsonAnswer(output: unknown, status: number): Response {
  if (output instanceof Response) return output;
  if (status === 204 || output === undefined) return new Response(null, { status: 204 });
  return Response.json(output, { status, headers: { 'cache-control': 'no-store' } });
}
