'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { ActionResult } from '@/lib/rules/action-result';

/** Why an act was refused: one sentence, and the items that are to blame where there are several. */
export interface Refusal {
  message: string;
  items: string[];
}

const MOST_ITEMS = 6;

/** Sends one act at a time; where it is done, the page and what the browser holds of the show are read anew. */
export function useAct<Input, Output>(send: (input: Input) => Promise<ActionResult<Output>>) {
  const router = useRouter();
  const queries = useQueryClient();
  const [busy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState<Refusal | null>(null);

  async function act(input: Input, onDone: (output: Output) => void): Promise<void> {
    if (busy) return;
    setBusy(true);
    setRefusal(null);
    try {
      const result = await send(input);
      if (!result.ok) return setRefusal(refusalOf(result));
      onDone(result.data);
      router.refresh();
      await queries.invalidateQueries();
    } catch {
      setRefusal({ message: 'The server was not reached. Nothing was changed as far as is known; look again.', items: [] });
    } finally {
      setBusy(false);
    }
  }

  return { act, busy, refusal, forget: () => setRefusal(null) };
}

function refusalOf({ message, errors }: Extract<ActionResult<unknown>, { ok: false }>): Refusal {
  const items = errors.length > 1 ? errors.slice(0, MOST_ITEMS).map((error) => error.message) : [];
  return { message, items: errors.length > MOST_ITEMS ? [...items, `${errors.length - MOST_ITEMS} more`] : items };
}
