'use client';

import { useState } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { ReasonField } from '@/components/forms/reason-field';
import { ValueForm } from '@/components/parts/value-form';
import { Dialog } from '@/components/ui/dialog';
import type { Refusal } from '@/hooks/use-act';
import { useMaterials } from '@/hooks/use-materials';
import { useNamedPart } from '@/hooks/use-part';
import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { PartRow } from '@/lib/rules/part-row';
import type { ShotSlot } from '@/lib/rules/shot-detail';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { itemFor } from '@/lib/rules/value-change';

interface OverrideDialogProps {
  slot: ShotSlot | null;
  frame: ShowFrame;
  busy: boolean;
  refusal: Refusal | null;
  onDraft: (item: SetValuesItem) => void;
  onClose: () => void;
}

/** A part's own value in one shot, with its reason; a lead approves it like any other. */
export function OverrideDialog({ slot, ...rest }: OverrideDialogProps) {
  if (slot === null) return null;
  return <OverrideForm slot={slot} {...rest} />;
}

function OverrideForm({ slot, frame, busy, refusal, onDraft, onClose }: OverrideDialogProps & { slot: ShotSlot }) {
  const part = useNamedPart(frame.code, slot.asset, slot.part);
  const materials = useMaterials(frame.code);
  const [reason, setReason] = useState(slot.override?.reason ?? '');
  const [missing, setMissing] = useState(false);
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Override ${slot.asset} ${slot.part}`}
      description={`In ${slot.shot} alone; every other shot keeps the part’s own value. A lead approves it before it can be locked.`}
    >
      {part.isError ? (
        <p role="alert" className="text-14 text-wrong">
          {part.error.message}
        </p>
      ) : part.data === undefined ? (
        <p role="status" className="text-14 text-ink-2">
          Reading the part
        </p>
      ) : (
        <ValueForm
          rows={[standing(part.data.row, slot)]}
          frame={frame}
          materials={materials}
          busy={busy}
          forShot
          onSet={([{ row, change }]) => {
            if (reason.trim() === '') return setMissing(true);
            onDraft({ ...itemFor(row, change), shot: slot.shot, reason: reason.trim() });
          }}
        >
          <ReasonField
            value={reason}
            missing={missing}
            hint="It stands on the shot’s page and in its export."
            onChange={(value) => {
              setReason(value);
              setMissing(false);
            }}
          />
          <ActRefusal refusal={refusal} />
        </ValueForm>
      )}
    </Dialog>
  );
}

/** The part's row with what its override in the shot holds in place of its own. */
function standing(row: PartRow, { override }: ShotSlot): PartRow {
  if (override === null) return row;
  const { construction, mass_source, target_mass_kg, density_kg_m3, material, areal_density_kg_m2, wall_m } = override;
  return { ...row, construction, mass_source, target_mass_kg, density_kg_m3, material, areal_density_kg_m2, wall_m };
}
