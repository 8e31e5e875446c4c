import type { ZodType } from 'zod';
import { StudioError } from './studio-error';

/** The value as the schema has it; throws bad_input with the first field's path and, for lists, every failing item. */
export function parseInput<T>(schema: ZodType<T>, value: unknown): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const { issues } = parsed.error;
  const first = issues[0];
  const field = first.path.map(String).join('.');
  const errors = issues
    .filter((issue) => issue.path[0] === 'items' && typeof issue.path[1] === 'number')
    .map((issue) => ({
      index: issue.path[1] as number,
      code: 'bad_input',
      message: issue.message,
      field: issue.path.slice(2).map(String).join('.') || undefined,
    }));
  throw new StudioError('bad_input', field ? `${field}: ${first.message}` : first.message, { field: field || undefined, errors });
}
