import type { NextAuthOptions } from 'next-auth';
import CredentialsProvider from 'next-auth/providers/credentials';
import { database } from '@/db/client';
import { config } from '@/lib/config';
import { verifyCredentials } from './verify-credentials';

declare module 'next-auth' {
  interface Session {
    user: { id: string; name: string; email: string; sessionEpoch: number };
  }
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
    providers: [
      CredentialsProvider({
        name: 'E-mail and password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        authorize: (credentials) => verifyCredentials(database(), credentials?.email ?? '', credentials?.password ?? ''),
      }),
    ],
    callbacks: {
      jwt({ token, user }) {
        if (user) {
          token.userId = user.id;
          token.sessionEpoch = user.sessionEpoch;
        }
        return token;
      },
      session({ session, token }) {
        session.user.id = token.userId ?? '';
        session.user.sessionEpoch = token.sessionEpoch ?? -1;
        return session;
      },
    },
  };
  return cached;
}
