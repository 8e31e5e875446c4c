'use client';

import type { ReactNode } from 'react';
import { useDrawable } from '@/hooks/use-drawable';
import { DrawingBoundary } from './drawing-boundary';

interface ViewerFrameProps {
  label: string;
  /** Why there is nothing to draw. */
  failure: string | null;
  /** Said while there is nothing to draw yet. */
  reading: string | null;
  children: ReactNode;
}

/** The place of a drawing, which takes the arrow keys; or why nothing is drawn in it. */
export function ViewerFrame({ label, failure, reading, children }: ViewerFrameProps) {
  const drawable = useDrawable();
  const told = failure ?? (drawable ? null : 'This browser cannot draw in three dimensions.');
  return (
    <div
      data-viewer
      tabIndex={told === null ? 0 : undefined}
      role="group"
      aria-label={`${label} Arrow keys turn it.`}
      className="relative min-h-80 flex-1 touch-none overflow-hidden focus-visible:-outline-offset-2"
    >
      {told !== null ? (
        <p className="flex h-full items-center justify-center px-6 text-14 text-ink-2">{told}</p>
      ) : reading !== null ? (
        <p role="status" className="flex h-full items-center justify-center text-14 text-ink-3">
          {reading}
        </p>
      ) : (
        <DrawingBoundary>{children}</DrawingBoundary>
      )}
    </div>
  );
}
