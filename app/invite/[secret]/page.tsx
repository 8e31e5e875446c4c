import type { Metadata } from 'next';
import { InvitationForm } from '@/components/account/invitation-form';
import { SpentLink } from '@/components/account/spent-link';
import { SignInFrame } from '@/components/shell/sign-in-frame';
import { findLink } from '@/lib/auth/find-link';
import { getOpenPageContext } from '@/lib/auth/get-page-context';
import { acceptInvitationAction } from './actions';

export const metadata: Metadata = { title: 'Invitation' };

export default async function InvitePage({ params }: { params: Promise<{ secret: string }> }) {
  const { secret } = await params;
  const { db } = await getOpenPageContext();
  const link = await findLink(db, 'invite', secret);
  return (
    <SignInFrame title={link.state === 'good' ? `Welcome, ${link.name}` : 'Invitation'}>
      {link.state === 'good' ? (
        <InvitationForm secret={secret} email={link.email} name={link.name} send={acceptInvitationAction} />
      ) : (
        <SpentLink purpose="invite" state={link.state} />
      )}
    </SignInFrame>
  );
}
