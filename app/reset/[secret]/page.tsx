import type { Metadata } from 'next';
import { ResetForm } from '@/components/account/reset-form';
import { SpentLink } from '@/components/account/spent-link';
import { SignInFrame } from '@/components/shell/sign-in-frame';
import { findLink } from '@/lib/auth/find-link';
import { getOpenPageContext } from '@/lib/auth/get-page-context';
import { resetPasswordAction } from '../actions';

export const metadata: Metadata = { title: 'New password' };

export default async function ResetLinkPage({ params }: { params: Promise<{ secret: string }> }) {
  const { secret } = await params;
  const { db } = await getOpenPageContext();
  const link = await findLink(db, 'reset', secret);
  return (
    <SignInFrame title="New password">
      {link.state === 'good' ? <ResetForm secret={secret} email={link.email} send={resetPasswordAction} /> : <SpentLink purpose="reset" state={link.state} />}
    </SignInFrame>
  );
}
