'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { usePartRenames, type RenameScope } from '@/hooks/use-part-renames';
import { AssetRenameList } from './asset-rename-list';
import { standingWords } from './rename-words';

interface PartRenamesProps {
  show: string;
  scope: RenameScope;
  /** A td or lead decides; others see what is open. */
  mayDecide: boolean;
  /** The import is not over: what its versions lack is not known yet. */
  waiting?: boolean;
}

/** A strip that says which parts look renamed, and the list in which somebody decides. Nothing where no part is in question. */
export function PartRenames({ show, scope, mayDecide, waiting = false }: PartRenamesProps) {
  const [isOpen, setIsOpen] = useState(false);
  const { items, busy, refusal, decide } = usePartRenames(show, scope, waiting);
  // Beside a whole import, parts that are merely gone are no news; an asset's own page offers to match them by hand.
  const open = 'asset' in scope ? items : items.filter((one) => one.proposals.length > 0);
  if (open.length === 0 && !isOpen) return null;
  const sure = open.flatMap((one) => one.proposals.map((proposal) => ({ one, proposal })));
  return (
    <section aria-label="Renamed parts">
      {open.length === 0 ? null : (
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2 border-b border-rule bg-bench px-4 py-2.5 text-14 md:px-6">
          <p className={sure.length > 0 ? 'text-ink' : 'text-ink-2'}>{standingWords(open)}</p>
          <Button size="small" onClick={() => setIsOpen(true)}>
            {mayDecide ? (sure.length > 0 ? 'Decide' : 'Match by hand') : 'Look'}
          </Button>
        </div>
      )}
      <Dialog
        open={isOpen}
        onOpenChange={setIsOpen}
        title={sure.length > 0 || open.length === 0 ? 'Renamed parts' : 'Parts by hand'}
        description="The same part keeps its mass, approvals and locks under the new name. Locked rows stay as they are."
        className="sm:w-[44rem]"
      >
        {open.length === 0 ? <p className="text-14 text-ink-2">Nothing is open.</p> : null}
        <div className="flex flex-col gap-6">
          {open.map((one) => (
            <AssetRenameList key={`${one.asset} ${one.version}`} renames={one} mayDecide={mayDecide} busy={busy} onDecide={decide} />
          ))}
        </div>
        {refusal === null ? null : (
          <p role="alert" className="mt-4 text-13 text-wrong">
            {refusal}
          </p>
        )}
      </Dialog>
    </section>
  );
}
