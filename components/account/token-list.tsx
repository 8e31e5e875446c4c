'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition } from 'react';
import { toast } from 'sonner';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { Button } from '@/components/ui/button';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { When } from '@/components/users/when';
import type { ActionResult } from '@/lib/rules/action-result';

export interface Token {
  id: string;
  name: string;
  created_at: string;
  last_used_at: string | null;
  expires_at: string | null;
  expired: boolean;
}

/** One's own tokens. */
export function TokenList({
  tokens,
  revoke,
}: {
  tokens: readonly Token[];
  revoke: (input: { id: string }) => Promise<ActionResult<unknown>>;
}) {
  const router = useRouter();
  const [ending, setEnding] = useState<Token | null>(null);
  const [busy, start] = useTransition();

  function end(token: Token) {
    start(async () => {
      const result = await revoke({ id: token.id });
      if (!result.ok) return void toast.error(result.message);
      setEnding(null);
      toast(`${token.name} is revoked`);
      router.refresh();
    });
  }

  if (tokens.length === 0)
    return <p className="text-14 text-ink-2">No token yet. A script sends one to do what you may do.</p>;
  return (
    <>
      <Table>
        <thead>
          <tr>
            <TableHead className="pl-0">Name</TableHead>
            <TableHead>Made</TableHead>
            <TableHead>Last used</TableHead>
            <TableHead>Ends</TableHead>
            <TableHead>
              <span className="sr-only">Acts</span>
            </TableHead>
          </tr>
        </thead>
        <tbody>
          {tokens.map((token) => (
            <TableRow key={token.id}>
              <TableCell className="max-w-60 truncate pl-0">{token.name}</TableCell>
              <TableCell className="text-ink-2">
                <When at={token.created_at} dateOnly />
              </TableCell>
              <TableCell className="text-ink-2">
                {token.last_used_at === null ? 'never' : <When at={token.last_used_at} />}
              </TableCell>
              <TableCell className="text-ink-2">{ends(token)}</TableCell>
              <TableCell className="pr-0 text-right">
                <Button size="small" look="quiet" onClick={() => setEnding(token)} aria-label={`Revoke ${token.name}`}>
                  Revoke
                </Button>
              </TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      {ending === null ? null : (
        <ConfirmDialog
          open
          onOpenChange={() => setEnding(null)}
          title={`Revoke ${ending.name}`}
          act="Revoke"
          busy={busy}
          onConfirm={() => end(ending)}
        >
          Whatever uses it is refused from now on.
        </ConfirmDialog>
      )}
    </>
  );
}

function ends(token: Token) {
  if (token.expires_at === null) return 'never';
  if (token.expired) return 'has ended';
  return <When at={token.expires_at} dateOnly />;
}
