import { formatProse } from '@/lib/rules/format-figure';

interface PartsStatusBarProps {
  parts: number;
  assets: number;
  chosen: number;
  massKg: number;
  /** More pages are being read. */
  reading: boolean;
  /** Reads the rows that could not be read; null where none are missing. */
  onReadRest: (() => void) | null;
  online: boolean;
  onKeys: () => void;
}

const count = (number: number, one: string, many: string) =>
  `${number.toLocaleString('en')} ${number === 1 ? one : many}`;

/** What is shown, counted, and the keys at hand. */
export function PartsStatusBar({
  parts,
  assets,
  chosen,
  massKg,
  reading,
  onReadRest,
  online,
  onKeys,
}: PartsStatusBarProps) {
  return (
    <footer className="flex h-9 items-center gap-6 border-t border-rule bg-bench px-4 text-12 whitespace-nowrap text-ink-2 md:px-6">
      <p role="status">
        {count(parts, 'part', 'parts')} in {count(assets, 'asset', 'assets')}
        {chosen > 0 ? ` · ${chosen.toLocaleString('en')} chosen` : ''}
        {reading ? ' · reading more' : ''}
      </p>
      {onReadRest === null ? null : (
        <p className="text-wrong">
          Not all rows could be read.{' '}
          <button type="button" onClick={onReadRest} className="link">
            Read on
          </button>
        </p>
      )}
      <p>Total of what is shown: {formatProse(massKg)} kg</p>
      {online ? (
        <p className="text-ink-3 max-lg:hidden">Figures show four digits, copying takes all</p>
      ) : (
        <p className="text-wrong">Offline. What is shown may be old, and nothing can be set.</p>
      )}
      <p className="ml-auto text-ink-3 max-lg:hidden">
        ↑ ↓ move · type to set · space chooses ·{' '}
        <button type="button" onClick={onKeys} className="text-ink-2 hover:text-ink">
          ? keys
        </button>
      </p>
    </footer>
  );
}
