'use client';

import { signIn } from 'next-auth/react';
import { SignInForm } from '@/components/shell/sign-in-form';
import { signInRefusal } from '@/lib/rules/sign-in-refusal';

/** The sign-in form; leads on to the page that was asked for. */
export function SignInPanel({ leadTo }: { leadTo: string }) {
  async function onSignIn(email: string, password: string): Promise<string | null> {
    const answer = await signIn('credentials', { email, password, redirect: false });
    if (answer?.error || !answer?.ok) return signInRefusal(answer?.error);
    window.location.assign(leadTo);
    return null;
  }
  return <SignInForm onSignIn={onSignIn} resetHref="/reset" />;
}
