'use client';

import { useSyncExternalStore } from 'react';

const noChange = () => () => undefined;

let drawableHere: boolean | null = null;

function canDraw(): boolean {
  drawableHere ??= document.createElement('canvas').getContext('webgl2') !== null;
  return drawableHere;
}

/** Whether this browser draws in three dimensions. */
export function useDrawable(): boolean {
  return useSyncExternalStore(noChange, canDraw, () => true);
}
