import type { NextAuthOptions } from 'next-auth';
import CredentialsProvider from 'next-auth/providers/credentials';
import { database } from '@/db/client';
import { config } from '@/lib/config';
import { notifySignOut } from '@/lib/imports/notify-import';
import { log } from '@/lib/log';
import { sessionCookie } from './session-cookie';
import { verifyCredentials } from './verify-credentials';

declare module 'next-auth' {
  interface User {
    id: string;
    sessionEpoch: number;
  }
}

declare module 'next-auth/jwt' {
  interface JWT {
    userId?: string;
    sessionEpoch?: number;
  }
}

const TWELVE_HOURS_S = 12 * 60 * 60;

let cached: NextAuthOptions | null = null;

/** Sign-in by e-mail and password. The session only names the user and their epoch; rights are read anew at every request. */
export function authOptions(): NextAuthOptions {
  cached ??= {
    secret: config().authSecret ?? undefined,
    session: { strategy: 'jwt', maxAge: TWELVE_HOURS_S },
    pages: { signIn: '/sign-in', error: '/sign-in' },
    cookies: {
      sessionToken: {
        name: sessionCookie().name,
        options: { httpOnly: true, sameSite: 'lax', path: '/', secure: sessionCookie().secure },
      },
    },
    providers: [
      CredentialsProvider({
        name: 'E-mail and password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        authorize: async (credentials) => {
          const outcome = await verifyCredentials(database(), credentials?.email ?? '', credentials?.password ?? '');
          // next-auth hands an error's message to the form: a code, which the form turns into a sentence.
          if (outcome.state === 'too_many') throw new Error(`too_many_attempts:${outcome.until.getTime()}`);
          return outcome.state === 'fits' ? outcome.user : null;
        },
      }),
    ],
    events: {
      async signOut({ token }) {
        if (token?.userId) await notifySignOut(database(), token.userId).catch((error: unknown) => log.warn({ err: error }, 'a sign-out could not be told'));
      },
    },
    callbacks: {
      jwt({ token, user }) {
        if (user) {
          token.userId = user.id;
          token.sessionEpoch = user.sessionEpoch;
        }
        return token;
      },
    },
  };
  return cached;
}
