const NOWHERE = 'http://nowhere.invalid';

/**
 * A path of our own to lead somebody back to; the fall-back for anything else: other origins, scheme-relative addresses,
 * backslashes (browsers read them as slashes) and control characters (browsers drop them).
 */
export function safePath(value: string | null | undefined, fallback = '/shows'): string {
  if (!value || !value.startsWith('/') || /[\\\u0000-\u001f\u007f]/.test(value)) return fallback;
  if (!URL.canParse(value, NOWHERE)) return fallback;
  const url = new URL(value, NOWHERE);
  if (url.origin !== NOWHERE || url.pathname.startsWith('//')) return fallback;
  if (url.pathname === '/sign-in') return fallback;
  return url.pathname + url.search + url.hash;
}
