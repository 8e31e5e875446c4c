import NextAuth from 'next-auth';
import { authOptions } from './options';

/** next-auth's own requests: the form's protection token, signing in and signing out. */
export function answerSignIn(request: Request, context: { params: Promise<{ nextauth: string[] }> }): Promise<Response> {
  return NextAuth(authOptions())(request, context) as Promise<Response>;
}
