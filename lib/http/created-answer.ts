import type { Context } from '@/lib/context';

/** A verb of PUT, whose answer is 201 where it made something and 200 where it was there before. */
export function createdAnswer<Input, Output extends { created: boolean }>(verb: (context: Context, input: Input) => Promise<Output>) {
  return async (context: Context, input: Input): Promise<Response> => {
    const { created, ...answer } = await verb(context, input);
    return Response.json(answer, { status: created ? 201 : 200, headers: { 'cache-control': 'no-store' } });
  };
}
