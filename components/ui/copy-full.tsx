'use client';

import type { ClipboardEvent, ReactNode } from 'react';

const CELL = '[role="gridcell"], [role="rowheader"], td, th, dd, dt';
const ROW = '[role="row"], tr, dl > div';

/** Puts every digit of the selected figures on the clipboard instead of the four shown; other copying is left alone. */
export function copyFull(event: ClipboardEvent): void {
  const selection = document.getSelection();
  if (selection === null || selection.isCollapsed || selection.rangeCount === 0) return;
  const range = selection.getRangeAt(0);
  const inside = elementOf(range.commonAncestorContainer)?.closest<HTMLElement>('[data-full]');
  const text = inside ? (inside.dataset.full ?? '') : textOf(range.cloneContents());
  if (text === null) return;
  event.clipboardData.setData('text/plain', text);
  event.preventDefault();
}

function elementOf(node: Node): Element | null {
  return node instanceof Element ? node : node.parentElement;
}

/** Cells parted by tabs and rows by lines; null where no figure is among them. */
function textOf(fragment: DocumentFragment): string | null {
  const figures = fragment.querySelectorAll<HTMLElement>('[data-full]');
  if (figures.length === 0) return null;
  for (const figure of figures) figure.textContent = figure.dataset.full ?? '';
  for (const hidden of fragment.querySelectorAll('.sr-only, svg')) hidden.remove();
  for (const cell of fragment.querySelectorAll(CELL)) if (cell.nextElementSibling?.matches(CELL)) cell.append('\t');
  for (const row of fragment.querySelectorAll(ROW)) if (row.nextElementSibling?.matches(ROW)) row.append('\n');
  return (fragment.textContent ?? '').trim();
}

/** Wraps what holds figures. */
export function CopyFull({ className, children }: { className?: string; children: ReactNode }) {
  return (
    <div className={className} onCopy={copyFull}>
      {children}
    </div>
  );
}
