import { StudioError } from '@/lib/rules/studio-error';

/** What the sender says the body's SHA-256 is, in `x-content-sha256`, as lower-case hex; null when nothing is said. Errors: bad_input. */
export function announcedHash(request: Request): string | null {
  const announced = request.headers.get('x-content-sha256')?.trim().toLowerCase() ?? null;
  if (announced !== null && !/^[0-9a-f]{64}$/.test(announced)) throw new StudioError('bad_input', 'x-content-sha256 is 64 hexadecimal digits.', { field: 'x-content-sha256' });
  return announced;
}
