import { TriangleAlert } from 'lucide-react';
import { CAUTION } from '@/lib/rules/export-preview';

/** What the values are not for. */
export function Caution() {
  return (
    <p role="note" className="flex max-w-3xl gap-2.5 px-4 py-4 text-13 text-ink-2 md:px-6">
      <TriangleAlert aria-hidden className="mt-0.5 size-4 shrink-0 text-brass" />
      {CAUTION}
    </p>
  );
}
