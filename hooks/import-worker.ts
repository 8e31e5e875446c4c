import { ImportHub, type NewsSource, type Watch } from './import-hub';

/** A tab that was not heard of for so long is taken to be closed. Hidden tabs are let speak once a minute. */
const SILENT_MS = 3 * 60_000;

const hub = new ImportHub((path) => new EventSource(path) as NewsSource);

/** The worker that all tabs of a browser share: each says by messages what it watches, and is told the news of that. */
self.addEventListener('connect', (event) => {
  const [port] = (event as MessageEvent).ports;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const watch = (watches: readonly Watch[]) => hub.watch(port, watches, (news) => port.postMessage(news));
  port.onmessage = ({ data }: MessageEvent<readonly Watch[]>) => {
    clearTimeout(timer);
    timer = setTimeout(() => watch([]), SILENT_MS);
    watch(data);
  };
});
