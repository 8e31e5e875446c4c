import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInPanel } from '@/components/account/sign-in-panel';
import { SignInFrame } from '@/components/shell/sign-in-frame';
import { getOpenPageContext } from '@/lib/auth/get-page-context';
import { safePath } from '@/lib/rules/safe-path';
import { hasUsers } from '@/lib/users/has-users';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({ searchParams }: { searchParams: Promise<{ callbackUrl?: string | string[] }> }) {
  const { callbackUrl } = await searchParams;
  const leadTo = safePath(Array.isArray(callbackUrl) ? callbackUrl[0] : callbackUrl);
  const { actor, db } = await getOpenPageContext();
  if (actor) redirect(leadTo);
  if (!(await hasUsers(db))) redirect('/first-run');
  return (
    <SignInFrame title="Sign in">
      <SignInPanel leadTo={leadTo} />
    </SignInFrame>
  );
}
