import { log } from '@/lib/log';
import { noticesReady, onSignOut, QUIET_MS } from './import-notices';
import { registerStream } from './open-streams';

const HEARTBEAT_MS = 15_000;
/** A browser that lost the stream waits so long before it asks again. */
const RETRY_MS = 2_000;

interface EventSourceOfOurs {
  /** Whose stream it is: it ends when they sign out somewhere, and browsers that are still signed in open it again. */
  userId: string;
  /** Waits for news, calling `onNews` when some may be there. Answers how to stop. */
  subscribe: (onNews: () => void) => () => void;
  /** What is to be sent now. `isOver` ends the stream after it. */
  read: () => Promise<{ events: string[]; isOver: boolean }>;
  /** Asked every 15 s, with the heartbeat: whether the reader may still read. */
  mayGoOn: () => Promise<boolean>;
  signal: AbortSignal;
}

/** One server-sent event as text. */
export function eventText(id: string, event: string, data: unknown): string {
  return `id: ${id}\nevent: ${event}\ndata: ${JSON.stringify(data)}\n\n`;
}

/**
 * A server-sent stream: news when there are some, a heartbeat every 15 s. It ends with its source, with the server, when its reader
 * goes, signs out or may not read any more, and on any fault: the reader then comes back with Last-Event-ID.
 */
export function eventStream(source: EventSourceOfOurs): Response {
  return new Response(streamOf(source), {
    headers: { 'content-type': 'text/event-stream; charset=utf-8', 'cache-control': 'no-cache, no-transform', 'x-accel-buffering': 'no' },
  });
}

function streamOf(source: EventSourceOfOurs): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let close = () => {};
  return new ReadableStream<Uint8Array>({
    start(controller) {
      let isBusy = false;
      let isDue = false;
      let isClosed = false;
      let pause: NodeJS.Timeout | undefined;
      const send = (text: string) => !isClosed && controller.enqueue(encoder.encode(text));
      const guarded = async (work: () => Promise<void>) => {
        try {
          await work();
        } catch (error) {
          if (!isClosed) log.warn({ err: error }, 'an event stream ended early');
          close();
        }
      };
      const tell = async () => {
        if (isBusy) return void (isDue = true);
        isBusy = true;
        isDue = false;
        await guarded(async () => {
          const { events, isOver } = await source.read();
          for (const event of events) send(event);
          if (isOver) close();
        });
        if (isClosed) return;
        // What happened while this was read and sent is told with the next second's news.
        pause = setTimeout(() => {
          isBusy = false;
          if (isDue) void tell();
        }, QUIET_MS);
      };
      const heartbeat = setInterval(
        () =>
          void guarded(async () => {
            if (await source.mayGoOn()) send(': still here\n\n');
            else close();
          }),
        HEARTBEAT_MS,
      );
      const stops = [source.subscribe(() => void tell()), onSignOut(source.userId, () => close()), registerStream(() => close())];
      close = () => {
        if (isClosed) return;
        isClosed = true;
        clearInterval(heartbeat);
        clearTimeout(pause);
        for (const stop of stops) stop();
        controller.close();
      };
      if (source.signal.aborted) return close();
      source.signal.addEventListener('abort', () => close());
      send(`retry: ${RETRY_MS}\n\n`);
      void noticesReady().then(() => !isClosed && tell());
    },
    cancel() {
      close();
    },
  });
}
