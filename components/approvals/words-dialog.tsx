'use client';

import { useState, type ReactNode } from 'react';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { TextArea } from '@/components/ui/text-area';
import type { ActRefusal } from '@/hooks/use-approval-acts';

export interface WordsWish {
  title: string;
  description?: ReactNode;
  /** Label of the text, and whether it may stay empty. */
  label: string;
  required: boolean;
  /** The act in a word or two, on its button. */
  act: string;
  maxLength: number;
  send: (text: string) => Promise<ActRefusal>;
}

/** An act that takes words along: a note or a reason. What was typed stays until the act is done. */
export function WordsDialog({ wish, onClose }: { wish: WordsWish | null; onClose: () => void }) {
  if (wish === null) return null;
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={wish.title} description={wish.description}>
      <WordsForm wish={wish} onClose={onClose} />
    </Dialog>
  );
}

function WordsForm({ wish, onClose }: { wish: WordsWish; onClose: () => void }) {
  const [text, setText] = useState('');
  const [missing, setMissing] = useState(false);
  const [refusal, setRefusal] = useState<ActRefusal>(null);
  const [busy, setBusy] = useState(false);

  async function send() {
    if (wish.required && text.trim() === '') return setMissing(true);
    setBusy(true);
    const refused = await wish.send(text.trim());
    setBusy(false);
    if (refused === null) onClose();
    else setRefusal(refused);
  }

  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void send();
      }}
    >
      <Field label={wish.label} error={missing ? 'Say why.' : null}>
        <TextArea
          value={text}
          rows={3}
          maxLength={wish.maxLength}
          onChange={(event) => {
            setText(event.target.value);
            setMissing(false);
          }}
          onKeyDown={(event) => {
            if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) void send();
          }}
        />
      </Field>
      <FormRefusal>{refusal?.message ?? null}</FormRefusal>
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Leave it
        </Button>
        <Button type="submit" look="filled" disabled={busy}>
          {wish.act}
        </Button>
      </div>
    </form>
  );
}
