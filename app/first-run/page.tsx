import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { FirstAdminForm } from '@/components/account/first-admin-form';
import { SignInFrame } from '@/components/shell/sign-in-frame';
import { getOpenPageContext } from '@/lib/auth/get-page-context';
import { hasUsers } from '@/lib/users/has-users';
import { createFirstAdminAction } from './actions';

export const metadata: Metadata = { title: 'Set up' };

export default async function FirstRunPage() {
  const { db } = await getOpenPageContext();
  if (await hasUsers(db)) redirect('/sign-in');
  return (
    <SignInFrame title="Set up Weighhouse">
      <FirstAdminForm send={createFirstAdminAction} />
    </SignInFrame>
  );
}
