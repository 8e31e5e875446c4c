import { KeysDialog, type KeyLine } from '@/components/ui/keys-dialog';

const KEYS: readonly KeyLine[] = [
  [['↑', '↓'], 'Move'],
  [['Shift', '↓'], 'Choose on the way'],
  [['Space'], 'Choose or let go'],
  [['Ctrl', 'A'], 'Choose all that is shown'],
  [['Esc'], 'Let go of all'],
  [['0', '…', '9'], 'Type a mass or density'],
  [['F2'], 'Type, letters too'],
  [['M'], 'Set mass and construction'],
  [['A'], 'Ask for approval'],
  [['Ctrl', 'Z'], 'Take back the last act'],
  [['Ctrl', 'C'], 'Copy the rows with all digits'],
  [['←', '→'], 'Close or open an asset'],
  [['Enter'], 'Open the part'],
  [['/'], 'Find'],
  [['I'], 'Show or hide the inspector'],
];

export function PartsKeys({ open, onClose }: { open: boolean; onClose: () => void }) {
  return <KeysDialog title="Keys of the parts table" keys={KEYS} open={open} onClose={onClose} />;
}
