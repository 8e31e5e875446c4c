import type { FormatWarning } from '../engine/cage';
import type { TextPlace } from './mesh-error';

export const WARNINGS_KEPT = 50;

/** Warnings of one file: the first of each kind, at most fifty. */
export class WarningList {
  readonly items: FormatWarning[] = [];
  private readonly seen = new Set<string>();

  has(kind: string): boolean {
    return this.seen.has(kind) || this.seen.size >= WARNINGS_KEPT;
  }

  add(kind: string, code: string, message: string, place: TextPlace): void {
    if (this.has(kind)) return;
    this.seen.add(kind);
    this.items.push({ code, message, line: place.line, column: place.column });
  }
}
