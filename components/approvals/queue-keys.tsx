import { KeysDialog, type KeyLine } from '@/components/ui/keys-dialog';

const READING: readonly KeyLine[] = [
  [['↑', '↓', 'K', 'J'], 'Move'],
  [['X'], 'Choose or let go'],
  [['Shift', '↓'], 'Choose on the way'],
  [['Ctrl', 'A'], 'Choose all that is shown'],
  [['Esc'], 'Let go of all'],
  [['C'], 'Compare'],
  [['Enter'], 'Open the part'],
];

const ASKING: readonly KeyLine[] = [[['Q'], 'Ask for approval, or take the question back']];

const APPROVING: readonly KeyLine[] = [
  [['A'], 'Approve'],
  [['N'], 'Approve with a note'],
  [['Shift', 'A'], 'Approve the asset’s values without warnings'],
  [['T'], 'Take back the approval'],
  [['O'], 'Carry over what stays within tolerance'],
];

interface QueueKeysProps {
  mayApprove: boolean;
  mayAsk: boolean;
  open: boolean;
  onClose: () => void;
}

export function QueueKeys({ mayApprove, mayAsk, open, onClose }: QueueKeysProps) {
  const keys = [...(mayApprove ? APPROVING : []), ...(mayAsk ? ASKING : []), ...READING];
  return <KeysDialog title="Keys of the approvals queue" keys={keys} open={open} onClose={onClose} />;
}
