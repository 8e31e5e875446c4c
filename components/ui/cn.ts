import { clsx, type ClassValue } from 'clsx';
import { extendTailwindMerge } from 'tailwind-merge';

// The theme's own size and colour names, or "text-13 text-ink-2" would be taken for two sizes and the first dropped.
const merge = extendTailwindMerge({
  extend: { classGroups: { 'font-size': [{ text: ['12', '13', '14', '16', '22', '32'] }] } },
});

/** Joins class names; of two that set the same property the later wins. */
export function cn(...values: ClassValue[]): string {
  return merge(clsx(values));
}
