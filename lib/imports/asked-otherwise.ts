import type { Cage, FormatWarning } from '@/lib/engine/cage';
import type { MeasureOptions } from '@/lib/engine/measured';

/** Where the file itself asks for another scheme, boundary or triangle rule than it was measured under: the import's settings win, and it is said. */
export function askedOtherwise({ scheme, boundary, triangles }: Pick<Cage, 'scheme' | 'boundary' | 'triangles'>, options: MeasureOptions): FormatWarning[] {
  const asked: [code: string, what: string, by: string | null | undefined, used: string][] = [
    ['scheme_differs', 'the scheme', scheme, options.scheme],
    ['boundary_differs', 'the boundary', boundary, options.boundary],
    ['triangles_differ', 'the triangle rule', triangles, options.triangles],
  ];
  const different = asked.filter(([, , by, used]) => by !== null && by !== undefined && by !== used);
  // What a scheme does with borders and triangles is no matter where the scheme is another.
  const told = different[0]?.[0] === 'scheme_differs' ? different.slice(0, 1) : different;
  return told.map(([code, what, by, used]) => ({ code, message: `The file asks for ${what} ${by}; it was measured under ${used}.`, line: null, column: null }));
}
