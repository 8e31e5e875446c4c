import type { ImportDetail } from '@/lib/rules/import-answer';

/** One import that somebody looks at, and how far they know it. */
export interface Watch {
  show: string;
  id: string;
  mark: string;
}

/** What a hub tells those who watch: news of an import; that it is not theirs to read; whether the stream stands. */
export type HubNews = { kind: 'import'; show: string; id: string; news: ImportDetail } | { kind: 'gone'; show: string; id: string } | { kind: 'stream'; isOpen: boolean };

/** The part of EventSource that a hub uses. */
export interface NewsSource {
  readonly readyState: number;
  onopen: (() => void) | null;
  onerror: (() => void) | null;
  addEventListener: (kind: 'import' | 'gone', hear: (event: { data: string }) => void) => void;
  close: () => void;
}

const CLOSED = 2;
const FIRST_WAIT_MS = 3_000;
const LONGEST_WAIT_MS = 60_000;
/** Watches that come together (a page that opens, tabs that wake) make one stream. */
const SETTLE_MS = 50;

const keyOf = ({ show, id }: { show: string; id: string }): string => `${show}/${id}`;
const isOver = (news: ImportDetail): boolean => news.state === 'done' || news.state === 'cancelled';

/**
 * Follows all that its watchers look at by one event stream. A stream that is opened anew goes on from the marks of what was heard, so
 * that nothing is missed; one that breaks for good (the server is away, nobody is signed in) is tried again, ever less often.
 */
export class ImportHub {
  private readonly watchers = new Map<object, { watches: Map<string, Watch>; hear: (news: HubNews) => void }>();
  private readonly marks = new Map<string, string>();
  private followed = '';
  private source: NewsSource | null = null;
  private timer: ReturnType<typeof setTimeout> | null = null;
  private wait = FIRST_WAIT_MS;

  constructor(private readonly open: (path: string) => NewsSource) {}

  /** Says all that this watcher looks at; an empty list lets it go. */
  watch(watcher: object, watches: readonly Watch[], hear: (news: HubNews) => void): void {
    // What was told to it already may still be on its way.
    const known = this.watchers.get(watcher)?.watches;
    const newer = (one: Watch): Watch => {
      const told = known?.get(keyOf(one));
      return told !== undefined && lower(one.mark, told.mark) ? told : one;
    };
    if (watches.length === 0) this.watchers.delete(watcher);
    else this.watchers.set(watcher, { watches: new Map(watches.map((one) => [keyOf(one), newer(one)])), hear });
    this.settle(SETTLE_MS);
  }

  private settle(ms: number): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = setTimeout(() => {
      this.timer = null;
      this.follow();
    }, ms);
  }

  private follow(): void {
    const wanted = new Map<string, Watch>();
    for (const { watches } of this.watchers.values()) for (const [key, one] of watches) if (!wanted.has(key) || lower(one.mark, wanted.get(key)!.mark)) wanted.set(key, one);
    for (const key of this.marks.keys()) if (!wanted.has(key)) this.marks.delete(key);
    // Somebody who knows less than the stream has told is told it again, from where they are.
    const behind = [...wanted].filter(([key, one]) => this.marks.has(key) && lower(one.mark, this.marks.get(key)!));
    for (const [key, one] of wanted) if (!this.marks.has(key) || behind.some(([known]) => known === key)) this.marks.set(key, one.mark);
    const followed = [...wanted.keys()].sort().join(',');
    if (followed === this.followed && behind.length === 0 && this.source !== null && this.source.readyState !== CLOSED) return;
    this.source?.close();
    this.source = null;
    this.followed = followed;
    if (wanted.size > 0) this.listen([...wanted.keys()].sort());
  }

  private listen(keys: readonly string[]): void {
    const watch = keys.map((key) => `${key.split('/').map(encodeURIComponent).join('/')}@${this.marks.get(key) ?? '0'}`).join(',');
    const source = this.open(`/api/v1/imports/events?watch=${watch}`);
    this.source = source;
    source.onopen = () => {
      this.wait = FIRST_WAIT_MS;
      this.tellAll({ kind: 'stream', isOpen: true });
    };
    source.addEventListener('import', ({ data }) => {
      const news = JSON.parse(data) as ImportDetail & { show: string };
      const key = keyOf(news);
      this.marks.set(key, news.mark);
      for (const { watches } of this.watchers.values()) if (watches.has(key)) watches.set(key, { ...watches.get(key)!, mark: news.mark });
      this.tell(key, { kind: 'import', show: news.show, id: news.id, news });
      if (isOver(news)) this.drop(key);
    });
    source.addEventListener('gone', ({ data }) => {
      const { show, id } = JSON.parse(data) as { show: string; id: string };
      this.tell(keyOf({ show, id }), { kind: 'gone', show, id });
      this.drop(keyOf({ show, id }));
    });
    source.onerror = () => {
      if (this.source !== source) return;
      this.tellAll({ kind: 'stream', isOpen: false });
      if (source.readyState !== CLOSED) return;
      this.settle(this.wait);
      this.wait = Math.min(this.wait * 2, LONGEST_WAIT_MS);
    };
  }

  /** What has ended is watched no more; the stream ends by itself with the last. */
  private drop(key: string): void {
    for (const [watcher, { watches, hear }] of this.watchers) {
      if (!watches.has(key)) continue;
      const left = new Map([...watches].filter(([other]) => other !== key));
      if (left.size === 0) this.watchers.delete(watcher);
      else this.watchers.set(watcher, { watches: left, hear });
    }
    this.marks.delete(key);
    this.followed = [...this.marks.keys()].sort().join(',');
    if (this.marks.size > 0) return;
    this.source?.close();
    this.source = null;
  }

  private tell(key: string, news: HubNews): void {
    for (const { watches, hear } of [...this.watchers.values()]) if (watches.has(key)) hear(news);
  }

  private tellAll(news: HubNews): void {
    for (const { hear } of [...this.watchers.values()]) hear(news);
  }
}

/** Marks are whole numbers of any length. */
function lower(a: string, b: string): boolean {
  return a.length === b.length ? a < b : a.length < b.length;
}
