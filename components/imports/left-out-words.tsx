import type { LeftOut } from '@/hooks/use-import-desk';

const files = (count: number): string => (count === 1 ? '1 file' : `${count.toLocaleString('en')} files`);

/** What was dropped and will not go up, and why. */
export function LeftOutWords({ leftOut }: { leftOut: LeftOut }) {
  const kinds = [...leftOut.otherKinds].sort((a, b) => b[1] - a[1]);
  const sentences = [
    kinds.length > 0 ? `Left out, since they hold no cage that can be read: ${kinds.map(([kind, count]) => `${count.toLocaleString('en')} ${kind === '' ? 'without extension' : `.${kind}`}`).join(', ')}.` : null,
    leftOut.tooLarge.length > 0 ? `Left out, since they are too large: ${leftOut.tooLarge.join(', ')}.` : null,
    leftOut.tooMany > 0 ? `${files(leftOut.tooMany)} more than one import takes. Bring the rest in another one.` : null,
  ].filter((sentence) => sentence !== null);
  if (sentences.length === 0) return null;
  return (
    <div role="status" className="flex flex-col gap-1 text-13 text-ink-2">
      {sentences.map((sentence) => (
        <p key={sentence}>{sentence}</p>
      ))}
    </div>
  );
}
