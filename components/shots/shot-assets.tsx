'use client';

import { X } from 'lucide-react';
import { useState, type SubmitEvent } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Section } from '@/components/parts/facts';
import { Button } from '@/components/ui/button';
import { IconButton } from '@/components/ui/icon-button';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { RemoveFromShotInput } from '@/lib/rules/inputs/remove-from-shot';
import type { ShotDetail } from '@/lib/rules/shot-detail';

interface ShotAssetsProps {
  show: string;
  shot: ShotDetail;
  /** Codes of the show's assets. */
  assets: readonly string[];
  mayEdit: boolean;
  put: (input: PutShotsInput) => Promise<ActionResult<{ items: unknown[] }>>;
  remove: (input: RemoveFromShotInput) => Promise<ActionResult<{ asset: string; removed: number }>>;
}

/** The assets in a shot and their copies; taking one out is refused while something of it is locked. */
export function ShotAssets({ show, shot, assets, mayEdit, put, remove }: ShotAssetsProps) {
  const [asset, setAsset] = useState('');
  const [copies, setCopies] = useState('1');
  const [wrong, setWrong] = useState<string | null>(null);
  const adding = useAct(put);
  const removing = useAct(remove);
  const held = (code: string) => shot.assets.find((one) => one.asset === code)?.copies ?? 0;

  function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    const count = Number(copies);
    if (asset === '') return setWrong('Choose an asset.');
    if (!Number.isInteger(count) || count < 1 || held(asset) + count > 200) return setWrong('Copies are a whole number, at most 200 of one asset in a shot.');
    setWrong(null);
    const items = [{ code: shot.code, sequence: shot.sequence, assets: [{ asset, copies: held(asset) + count }] }];
    void adding.act({ show, items }, () => {
      setAsset('');
      setCopies('1');
    });
  }

  return (
    <Section title="Assets in the shot">
      <ul className="text-13">
        {shot.assets.map((one) => (
          <li key={one.asset} className="flex min-h-8 items-center justify-between gap-2">
            <span>
              {one.asset}
              {one.copies > 1 ? <span className="text-ink-2"> ×{one.copies}</span> : null}
            </span>
            {mayEdit ? (
              <IconButton
                label={one.copies > 1 ? `Take one ${one.asset} out` : `Take ${one.asset} out`}
                disabled={removing.busy}
                onClick={() => void removing.act({ show, shot: shot.code, asset: one.asset, copies: 1 }, () => undefined)}
              >
                <X aria-hidden />
              </IconButton>
            ) : null}
          </li>
        ))}
      </ul>
      <ActRefusal refusal={removing.refusal} />
      {mayEdit ? (
        <form onSubmit={submit} noValidate className="mt-2 flex items-center gap-2">
          <Select aria-label="Asset" placeholder="Add an asset" value={asset} onValueChange={setAsset} options={assets.map((code) => ({ value: code, label: code }))} className="min-w-0 flex-1" />
          <Input aria-label="Copies" inputMode="numeric" value={copies} onChange={(event) => setCopies(event.target.value)} className="w-14 text-right font-mono" />
          <Button type="submit" disabled={adding.busy}>
            Add
          </Button>
        </form>
      ) : null}
      {wrong === null ? null : (
        <p role="alert" className="mt-1 text-13 text-wrong">
          {wrong}
        </p>
      )}
      <ActRefusal refusal={adding.refusal} />
    </Section>
  );
}
