import { ImportHub, type HubNews, type NewsSource, type Watch } from './import-hub';

/** How often a tab says again what it watches, so that the shared worker knows it is there. */
const SAY_AGAIN_MS = 25_000;

type Say = (watches: readonly Watch[]) => void;

/** What one tab looks at, told to the hub that all tabs share. */
class ImportLink {
  private readonly watches = new Map<object, { watch: Watch; hear: (news: HubNews) => void }>();
  private say: Say | null = null;
  private timer: ReturnType<typeof setInterval> | null = null;

  /** Follows an import from what is known of it; answers how to stop. */
  watch(watch: Watch, hear: (news: HubNews) => void): () => void {
    const self = {};
    this.watches.set(self, { watch: { ...watch }, hear });
    this.tell();
    this.timer ??= setInterval(() => this.tell(), SAY_AGAIN_MS);
    return () => {
      this.watches.delete(self);
      this.tell();
      if (this.watches.size > 0 || this.timer === null) return;
      clearInterval(this.timer);
      this.timer = null;
    };
  }

  private tell(): void {
    this.say ??= connect((news) => this.hear(news));
    this.say([...this.watches.values()].map(({ watch }) => watch));
  }

  private hear(news: HubNews): void {
    for (const [self, { watch, hear }] of [...this.watches]) {
      if (news.kind === 'stream') hear(news);
      else if (news.show === watch.show && news.id === watch.id) {
        if (news.kind === 'import') watch.mark = news.news.mark;
        // What has ended is not asked for again.
        if (news.kind === 'gone' || news.news.state === 'done' || news.news.state === 'cancelled') this.watches.delete(self);
        hear(news);
      }
    }
  }
}

/** The shared worker where the browser has one, else a hub of this tab's own. */
function connect(hear: (news: HubNews) => void): Say {
  let said: readonly Watch[] = [];
  let own: ImportHub | null = null;
  const self = {};
  const sayHere: Say = (watches) => {
    own ??= new ImportHub((path) => new EventSource(path) as NewsSource);
    own.watch(self, watches, hear);
  };
  if (typeof SharedWorker === 'undefined') return sayHere;
  const worker = new SharedWorker(new URL('./import-worker.ts', import.meta.url), { type: 'module', name: 'weighhouse imports' });
  let isLost = false;
  // A worker that cannot be loaded (an old tab after an update) leaves this tab to itself.
  worker.onerror = () => {
    isLost = true;
    sayHere(said);
  };
  worker.port.onmessage = ({ data }: MessageEvent<HubNews>) => hear(data);
  window.addEventListener('pagehide', () => worker.port.postMessage([]));
  window.addEventListener('pageshow', () => worker.port.postMessage(said));
  return (watches) => {
    said = watches;
    if (isLost) sayHere(watches);
    else worker.port.postMessage(watches);
  };
}

let link: ImportLink | null = null;

/** This tab's link to the one event stream of the browser. */
export function importLink(): ImportLink {
  return (link ??= new ImportLink());
}
