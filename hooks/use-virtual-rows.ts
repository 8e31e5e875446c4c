'use client';

import { useVirtualizer } from '@tanstack/react-virtual';
import type { RefObject } from 'react';

/** The rows of a long list that are in sight, with their places. Kept apart, since its answer changes without new props. */
export function useVirtualRows(
  scroller: RefObject<HTMLElement | null>,
  heights: (index: number) => number,
  count: number,
  keyOf: (index: number) => string,
  headHeight: number,
) {
  const virtualizer = useVirtualizer({
    count,
    getScrollElement: () => scroller.current,
    estimateSize: heights,
    getItemKey: keyOf,
    overscan: 12,
    scrollPaddingStart: headHeight,
  });
  return {
    items: virtualizer.getVirtualItems(),
    height: virtualizer.getTotalSize(),
    reveal: (index: number) => virtualizer.scrollToIndex(index, { align: 'auto' }),
    remeasure: () => virtualizer.measure(),
  };
}
