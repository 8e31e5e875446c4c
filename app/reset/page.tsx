import type { Metadata } from 'next';
import { ResetRequestForm } from '@/components/account/reset-request-form';
import { SignInFrame } from '@/components/shell/sign-in-frame';
import { config } from '@/lib/config';
import { requestResetAction } from './actions';

export const metadata: Metadata = { title: 'New password' };

export default function ResetPage() {
  return (
    <SignInFrame title="New password">
      <ResetRequestForm sendsMail={config().smtpUrl !== null} send={requestResetAction} />
    </SignInFrame>
  );
}
