import { signIn } from 'next-auth/react';

/** Signs in with what was just chosen and leads on; to the sign-in page where that did not work. */
export async function signInAndGo(email: string, password: string, leadTo: string): Promise<void> {
  const answer = await signIn('credentials', { email, password, redirect: false });
  window.location.assign(answer?.ok ? leadTo : `/sign-in?callbackUrl=${encodeURIComponent(leadTo)}`);
}
