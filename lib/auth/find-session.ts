import { decode, type JWT } from 'next-auth/jwt';
import { config } from '@/lib/config';
import { cookieOf, sessionCookie } from './session-cookie';

/** Whom a Cookie header's session names; null when there is none, it has run out, or it is not ours. */
export async function findSession(cookieHeader: string | null): Promise<{ userId: string; sessionEpoch: number } | null> {
  const secret = config().authSecret;
  const value = cookieOf(cookieHeader, sessionCookie().name);
  if (!secret || !value) return null;
  const token = await readable(value, secret);
  if (!token?.userId || token.sessionEpoch === undefined) return null;
  return { userId: token.userId, sessionEpoch: token.sessionEpoch };
}

async function readable(value: string, secret: string): Promise<JWT | null> {
  try {
    return await decode({ token: value, secret });
  } catch {
    return null;
  }
}
