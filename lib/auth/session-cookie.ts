import { config } from '@/lib/config';

/** Name and flags of the session's cookie; the prefix makes browsers insist on https where the address has it. */
export function sessionCookie(): { name: string; secure: boolean } {
  const secure = config().baseUrl.startsWith('https://');
  return { name: `${secure ? '__Secure-' : ''}weighhouse-session`, secure };
}

/** The value of one cookie of a Cookie header; null without it. */
export function cookieOf(header: string | null, name: string): string | null {
  for (const pair of (header ?? '').split(';')) {
    const at = pair.indexOf('=');
    if (at > 0 && pair.slice(0, at).trim() === name) return pair.slice(at + 1).trim();
  }
  return null;
}
