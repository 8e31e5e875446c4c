'use client';

import { useRouter } from 'next/navigation';
import { useTransition } from 'react';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import type { ActionResult } from '@/lib/rules/action-result';
import { When } from './when';

export interface Mail {
  id: string;
  to: string;
  subject: string;
  text: string | null;
  state: 'waiting' | 'sent' | 'local' | 'failed';
  error: string | null;
  created_at: string;
}

const STATES = { waiting: 'waiting', sent: 'sent', local: 'kept here', failed: 'not sent' } as const;

/** The studio's messages; those that stay here can be read and their links followed. */
export function MailList({
  mails,
  sendAgain,
}: {
  mails: readonly Mail[];
  sendAgain: (input: { id: string }) => Promise<ActionResult<unknown>>;
}) {
  const router = useRouter();
  const [busy, start] = useTransition();

  function again(mail: Mail) {
    start(async () => {
      const result = await sendAgain({ id: mail.id });
      if (!result.ok) return void toast.error(result.message);
      toast(`The message to ${mail.to} is sent again`);
      router.refresh();
    });
  }

  return (
    <ul className="flex flex-col">
      {mails.map((mail) => (
        <li key={mail.id} className="flex flex-col gap-1 border-b border-rule px-4 py-3 md:px-6">
          <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1">
            <h2 className="text-14 font-medium">{mail.subject}</h2>
            <p className="text-13 text-ink-2">to {mail.to}</p>
            <p className="ml-auto text-13 text-ink-3">
              <span className={mail.state === 'failed' ? 'text-wrong' : undefined}>{STATES[mail.state]}</span> ·{' '}
              <When at={mail.created_at} />
            </p>
          </div>
          {mail.error === null ? null : (
            <div className="flex flex-wrap items-center gap-3 text-13 text-ink-2">
              <p>{mail.error}</p>
              {mail.state === 'failed' ? (
                <Button
                  size="small"
                  disabled={busy}
                  onClick={() => again(mail)}
                  aria-label={`Send the message to ${mail.to} again`}
                >
                  Send again
                </Button>
              ) : null}
            </div>
          )}
          {mail.text === null ? null : (
            <details>
              <summary className="w-fit text-13 text-ink-2 hover:text-ink">Read</summary>
              <p className="mt-2 max-w-2xl text-14 break-words whitespace-pre-wrap text-ink-2">
                {withLinks(mail.text)}
              </p>
            </details>
          )}
        </li>
      ))}
    </ul>
  );
}

function withLinks(text: string) {
  return text.split(/(https?:\/\/\S+)/).map((piece, index) =>
    index % 2 === 0 ? (
      piece
    ) : (
      <a key={index} href={piece} className="link break-all">
        {piece}
      </a>
    ),
  );
}
