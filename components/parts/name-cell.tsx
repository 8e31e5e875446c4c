import { ChevronDown } from 'lucide-react';
import type { AssetNode, PartNode } from '@/lib/rules/arrange-parts';
import { rowName } from '@/lib/rules/part-key';
import { CATEGORY_WORDS } from '@/lib/rules/states';

/** A part's name; one that is longer than its column keeps both ends, where a side or a number stands. */
export function PartName({ node }: { node: PartNode }) {
  const name = rowName(node.row);
  const tail = name.length > 14 ? name.slice(-6) : '';
  return (
    <span className="flex min-w-0 pl-4 text-14" title={name}>
      <span className="truncate">{tail === '' ? name : name.slice(0, -6)}</span>
      <span className="whitespace-pre">{tail}</span>
    </span>
  );
}

export function AssetName({ node }: { node: AssetNode }) {
  const { asset, category } = node.total;
  return (
    <span className="flex min-w-0 items-baseline gap-2" title={asset}>
      <ChevronDown
        aria-hidden
        className="size-3 shrink-0 self-center text-ink-3 transition-transform duration-100 group-aria-[expanded=false]:-rotate-90"
      />
      <span className="truncate text-14 font-medium">{asset}</span>
      <span className="text-13 text-ink-3">{CATEGORY_WORDS[category]}</span>
    </span>
  );
}
