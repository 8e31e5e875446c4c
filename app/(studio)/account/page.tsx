import type { Metadata } from 'next';
import { setToldAction } from '@/app/shows/[show]/actions';
import { ChangePasswordForm } from '@/components/account/change-password-form';
import { MailChoice } from '@/components/account/mail-choice';
import { NewToken } from '@/components/account/new-token';
import { ThemeChoice } from '@/components/account/theme-choice';
import { TokenList } from '@/components/account/token-list';
import { ToldList } from '@/components/account/told-list';
import { Section } from '@/components/forms/section';
import { PageHeading } from '@/components/shell/page-heading';
import { getPageContext } from '@/lib/auth/get-page-context';
import { config } from '@/lib/config';
import { listTold } from '@/lib/notices/list-told';
import { listTokens } from '@/lib/tokens/list-tokens';
import { getMailChoice } from '@/lib/users/get-mail-choice';
import { addTokenAction, changePasswordAction, revokeTokenAction, setMailChoiceAction } from './actions';

export const metadata: Metadata = { title: 'Account' };

export default async function AccountPage() {
  const context = await getPageContext();
  const [tokens, choice, places] = await Promise.all([listTokens(context), getMailChoice(context), listTold(context)]);
  return (
    <>
      <PageHeading title={context.actor.name} measure={<p className="text-14 text-ink-2">{context.actor.email}</p>} />
      <div className="grid gap-x-14 gap-y-10 px-4 py-6 md:px-6 xl:grid-cols-[minmax(0,48rem)_minmax(0,1fr)]">
        <div className="flex min-w-0 flex-col gap-10">
          <Section title="Tokens for scripts">
            <NewToken send={addTokenAction} />
            <TokenList tokens={tokens} revoke={revokeTokenAction} />
          </Section>
          <Section title="What you are told of">
            <ToldList places={places} send={setToldAction} />
          </Section>
        </div>
        <div className="flex flex-col gap-10">
          <Section title="Mail">
            <MailChoice choice={choice} digestHour={config().digestHour} send={setMailChoiceAction} />
          </Section>
          <Section title="Password">
            <ChangePasswordForm email={context.actor.email} send={changePasswordAction} />
          </Section>
          <Section title="Theme">
            <ThemeChoice />
          </Section>
        </div>
      </div>
    </>
  );
}
