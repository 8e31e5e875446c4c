import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { EmptyState } from '@/components/ui/empty-state';
import { MailList } from '@/components/users/mail-list';
import { Pager } from '@/components/users/pager';
import { getAdminPageContext } from '@/lib/auth/get-page-context';
import { config } from '@/lib/config';
import { listMails } from '@/lib/mail/list-mails';
import { listMailsInput } from '@/lib/rules/inputs/list-mails';
import { sendMailAgainAction } from './actions';

export const metadata: Metadata = { title: 'Mailbox' };

export default async function MailPage({ searchParams }: { searchParams: Promise<{ page?: string }> }) {
  const context = await getAdminPageContext();
  const asked = listMailsInput.safeParse({ page: (await searchParams).page });
  const { page } = asked.success ? asked.data : { page: 1 };
  const { items, more } = await listMails(context, { page });
  const note = config().smtpUrl === null ? 'No mail server is set: messages stay here.' : 'Messages go out through the mail server.';
  return (
    <>
      <PageHeading title="Mailbox" measure={<p className="text-14 text-ink-2">{note}</p>} />
      {items.length === 0 ? (
        <EmptyState title="No message yet">Invitations, new passwords and news of a show appear here.</EmptyState>
      ) : (
        <MailList mails={items} sendAgain={sendMailAgainAction} />
      )}
      <Pager newerHref={page > 1 ? `/admin/mail?page=${page - 1}` : null} olderHref={more ? `/admin/mail?page=${page + 1}` : null} />
    </>
  );
}
