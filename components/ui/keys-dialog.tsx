'use client';

import { Dialog } from './dialog';
import { KeyHint } from './key-hint';

/** Keys pressed together, and what they do. */
export type KeyLine = readonly [keys: readonly string[], act: string];

/** The keys that a page answers to. */
export function KeysDialog({
  title,
  keys,
  open,
  onClose,
}: {
  title: string;
  keys: readonly KeyLine[];
  open: boolean;
  onClose: () => void;
}) {
  return (
    <Dialog open={open} onOpenChange={(next) => !next && onClose()} title={title}>
      <dl className="grid gap-y-1.5">
        {keys.map(([together, act]) => (
          <div key={act} className="flex items-center justify-between gap-4">
            <dt className="text-14 text-ink-2">{act}</dt>
            <dd className="flex gap-1">
              {together.map((key) => (
                <KeyHint key={key}>{key}</KeyHint>
              ))}
            </dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
