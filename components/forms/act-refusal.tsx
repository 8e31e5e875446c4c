import type { Refusal } from '@/hooks/use-act';

/** Why an act was refused, with the items to blame. */
export function ActRefusal({ refusal }: { refusal: Refusal | null }) {
  if (refusal === null) return null;
  return (
    <div role="alert" className="text-13 text-wrong">
      <p>{refusal.message}</p>
      {refusal.items.length === 0 ? null : (
        <ul className="mt-1 list-disc pl-5">
          {refusal.items.map((item) => (
            <li key={item}>{item}</li>
          ))}
        </ul>
      )}
    </div>
  );
}
