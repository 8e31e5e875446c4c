/** How often a file may be passed over for want of room before room is kept for it. */
const PATIENCE = 4;

interface Wish {
  id: string;
  bytes: number;
}

/**
 * What a process has set aside of the memory that it may measure in. A file that does not fit yet is passed over while smaller ones go on; passed over a few
 * times, it has room saved up for it, out of which nothing else is given, so that the small ones cannot keep it waiting for ever.
 */
export class MemoryLedger {
  private readonly held = new Map<string, number>();
  private readonly passes = new Map<string, number>();
  private wish: Wish | null = null;
  private claiming: Promise<unknown> = Promise.resolve();

  /** @param budget bytes that may be held at once */
  constructor(readonly budget: number) {}

  /** The file that room is being kept for. */
  get keptFor(): string | null {
    return this.wish?.id ?? null;
  }

  /** Bytes that this file may take now; `id` of a file for which room may have been kept. */
  roomFor(id: string): number {
    const kept = this.wish !== null && this.wish.id !== id ? this.wish.bytes : 0;
    return this.budget - this.total() - kept;
  }

  /** A file that would fit the budget was passed over. One wish at a time: the next one's turn comes after it. */
  passOver(id: string, bytes: number): void {
    const passes = (this.passes.get(id) ?? 0) + 1;
    this.passes.set(id, passes);
    if (this.wish === null && passes >= PATIENCE) this.wish = { id, bytes };
  }

  /** Nobody waits for this file any more: it was taken, here or elsewhere, or does not wait now. */
  forget(id: string): void {
    this.passes.delete(id);
    if (this.wish?.id === id) this.wish = null;
  }

  /** Sets aside so much for a holder in place of what it held; 0 gives all back. */
  hold(holder: string, bytes: number): void {
    if (bytes > 0) this.held.set(holder, bytes);
    else this.held.delete(holder);
  }

  /** One after another: what the next one sees has what the last one took set aside. */
  inOrder<T>(claim: () => Promise<T>): Promise<T> {
    const claimed = this.claiming.then(claim);
    this.claiming = claimed.catch(() => undefined);
    return claimed;
  }

  private total(): number {
    let bytes = 0;
    for (const held of this.held.values()) bytes += held;
    return bytes;
  }
}
