'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { TextArea } from '@/components/ui/text-area';
import { splitWords } from '@/lib/rules/split-words';
import type { Member } from './member-table';

interface GuestLimitsDialogProps {
  member: Member;
  busy: boolean;
  onClose: () => void;
  onSave: (limits: { shots: string[]; assets: string[] }) => void;
}

/** The shots and assets that a guest is invited to. */
export function GuestLimitsDialog({ member, busy, onClose, onSave }: GuestLimitsDialogProps) {
  const [shots, setShots] = useState(member.shots.join('\n'));
  const [assets, setAssets] = useState(member.assets.join('\n'));
  return (
    <Dialog
      open
      onOpenChange={onClose}
      title={`What ${member.name} may see`}
      description="A guest reads and exports what is locked there, and nothing else."
    >
      <div className="flex flex-col gap-4">
        <Field label="Shots" hint="Codes, one a line.">
          <TextArea
            rows={4}
            className="font-mono text-13"
            spellCheck={false}
            value={shots}
            onChange={(event) => setShots(event.target.value)}
          />
        </Field>
        <Field label="Assets" hint="Codes, one a line.">
          <TextArea
            rows={4}
            className="font-mono text-13"
            spellCheck={false}
            value={assets}
            onChange={(event) => setAssets(event.target.value)}
          />
        </Field>
        <Button
          look="filled"
          disabled={busy}
          className="self-end"
          onClick={() => onSave({ shots: splitWords(shots), assets: splitWords(assets) })}
        >
          Save
        </Button>
      </div>
    </Dialog>
  );
}
