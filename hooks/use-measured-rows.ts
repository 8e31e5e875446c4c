'use client';

import { useVirtualizer } from '@tanstack/react-virtual';
import type { RefObject } from 'react';

/** The rows of a long list that are in sight, each as high as it turns out to be. Kept apart, since its answer changes without new props. */
export function useMeasuredRows(scroller: RefObject<HTMLElement | null>, { count, likely, keyOf, headHeight }: { count: number; likely: number; keyOf: (index: number) => string; headHeight: number }) {
  const virtualizer = useVirtualizer({
    count,
    getScrollElement: () => scroller.current,
    estimateSize: () => likely,
    getItemKey: keyOf,
    overscan: 8,
    scrollPaddingStart: headHeight,
  });
  return { items: virtualizer.getVirtualItems(), height: virtualizer.getTotalSize(), measure: virtualizer.measureElement };
}
