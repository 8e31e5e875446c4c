'use client';

import { Dialog } from '@/components/ui/dialog';
import { KeyHint } from '@/components/ui/key-hint';

const KEYS: readonly (readonly [readonly string[], string])[] = [
  [['↑', '↓'], 'Move'],
  [['Shift', '↓'], 'Choose on the way'],
  [['Space'], 'Choose or let go'],
  [['Ctrl', 'A'], 'Choose all that is shown'],
  [['Esc'], 'Let go of all'],
  [['0', '…', '9'], 'Type a mass or density'],
  [['F2'], 'Type, letters too'],
  [['M'], 'Set mass and construction'],
  [['Ctrl', 'Z'], 'Take back the last act'],
  [['Ctrl', 'C'], 'Copy the rows with all digits'],
  [['←', '→'], 'Close or open an asset'],
  [['Enter'], 'Open the part'],
  [['/'], 'Find'],
  [['I'], 'Show or hide the inspector'],
];

export function KeysDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onOpenChange={(next) => !next && onClose()} title="Keys of the parts table">
      <dl className="grid gap-y-1.5">
        {KEYS.map(([keys, act]) => (
          <div key={act} className="flex items-center justify-between gap-4">
            <dt className="text-14 text-ink-2">{act}</dt>
            <dd className="flex gap-1">
              {keys.map((key) => (
                <KeyHint key={key}>{key}</KeyHint>
              ))}
            </dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
