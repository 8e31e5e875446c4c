import { alignOnPoint, formatEngineering, formatFixed, formatFull } from '@/lib/rules/format-figure';
import { cn } from './cn';

interface FigureProps {
  /** In the unit that the header or label names. */
  value: number | null;
  /** `fixed` for lengths and coordinates, `engineering` for what spans magnitudes: its exponent stands apart. */
  notation?: 'fixed' | 'engineering';
  /** Characters kept before and behind the point in a column; without it the figure takes its own width. */
  align?: { before: number; after: number };
  decimals?: number;
  /** What copying takes where the shown number is scaled. */
  full?: number | null;
  className?: string;
}

/** Characters before and behind the point in a column of masses or moments; the exponent has its own place behind them. */
export const ENGINEERING_WIDTHS = { before: 4, after: 5 };

/** A number: four significant digits to read, all of them when copied (see copy-full). */
export function Figure({ value, notation = 'fixed', align, decimals, full = value, className }: FigureProps) {
  const shown =
    value === null
      ? { text: '–', exponent: 0 }
      : notation === 'engineering'
        ? formatEngineering(value)
        : { text: formatFixed(value, decimals), exponent: 0 };
  const text = align === undefined ? shown.text : alignOnPoint(shown.text, align.before, align.after);
  return (
    <span
      data-full={value === null ? undefined : formatFull(full)}
      className={cn('font-mono text-13 whitespace-pre', value === null && 'text-ink-3', className)}
    >
      {text}
      {notation === 'engineering' ? <Exponent power={shown.exponent} apart={align !== undefined} /> : null}
    </span>
  );
}

function Exponent({ power, apart }: { power: number; apart: boolean }) {
  if (power === 0) return apart ? <span className="inline-block w-8.5" /> : null;
  return (
    <span className={cn('text-12 text-ink-3', apart && 'inline-block w-8.5')}>
      <span aria-hidden>·10</span>
      <span className="sr-only"> times ten to the power </span>
      <span className="relative -top-1 text-[0.6875rem]">{power < 0 ? `\u2212${-power}` : power}</span>
    </span>
  );
}
