'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition } from 'react';
import { toast } from 'sonner';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { Button } from '@/components/ui/button';
import type { ActionResult } from '@/lib/rules/action-result';

interface ArchiveShowProps {
  show: { code: string; archived: boolean };
  send: (input: { show: string; archived: boolean }) => Promise<ActionResult<unknown>>;
}

/** Puts a show away to be read only, or brings it back. */
export function ArchiveShow({ show, send }: ArchiveShowProps) {
  const router = useRouter();
  const [asks, setAsks] = useState(false);
  const [busy, start] = useTransition();

  function run(archived: boolean) {
    start(async () => {
      const result = await send({ show: show.code, archived });
      if (!result.ok) return void toast.error(result.message);
      setAsks(false);
      toast(archived ? `${show.code} is archived` : `${show.code} is back at work`);
      router.refresh();
    });
  }

  return (
    <section aria-labelledby="archive-heading" className="flex flex-col items-start gap-3 border-t border-rule pt-5">
      <h2 id="archive-heading">Archive</h2>
      <p className="text-14 text-ink-2">
        {show.archived
          ? 'This show is archived: everything can be read and exported, nothing changed.'
          : 'At wrap: everything can still be read and exported, nothing changed.'}
      </p>
      {show.archived ? (
        <Button disabled={busy} onClick={() => run(false)}>
          Bring the show back
        </Button>
      ) : (
        <Button onClick={() => setAsks(true)}>Archive the show</Button>
      )}
      <ConfirmDialog
        open={asks}
        onOpenChange={setAsks}
        title={`Archive ${show.code}`}
        act="Archive"
        busy={busy}
        onConfirm={() => run(true)}
      >
        Nobody can import, set masses or change people until it is brought back here.
      </ConfirmDialog>
    </section>
  );
}
