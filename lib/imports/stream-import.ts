import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { log } from '@/lib/log';
import type { ImportDetail, ImportFileAnswer } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { onImportNotice, QUIET_MS } from './import-notices';
import { listImportFiles } from './list-import-files';
import { registerStream } from './open-streams';

const HEARTBEAT_MS = 15_000;
/** A transaction may commit a little after the time it writes down. */
const OVERLAP_MS = 10_000;

/**
 * An import as server-sent events: first the whole of it, then its state and counts with the files that changed, at most one
 * event a second. An event's id is the database's time in milliseconds; with Last-Event-ID only what changed since is sent.
 * The stream ends with the import.
 */
export async function streamImport(context: Context, input: ImportRefInput, request: Request): Promise<Response> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  const { id } = await getImportRow(context.db, show.id, input.import);
  const since = Number(request.headers.get('last-event-id') ?? 0);
  const teller = new ImportTeller(context.db, show.id, id, Number.isFinite(since) ? since : 0);
  return new Response(eventStream(teller, id, request.signal), {
    headers: { 'content-type': 'text/event-stream; charset=utf-8', 'cache-control': 'no-cache, no-transform', 'x-accel-buffering': 'no' },
  });
}

/** What one reader was told already, so that an event has only what is new to them. */
class ImportTeller {
  private readonly told = new Map<string, string>();
  private toldState = '';

  constructor(
    private readonly db: Database,
    private readonly showId: string,
    private readonly id: string,
    private since: number,
  ) {}

  /** The next event; null when nothing changed for this reader. */
  async next(): Promise<{ event: string | null; isOver: boolean }> {
    const { detail, now } = await this.read();
    const files = detail.files.filter((file) => this.isNew(file));
    this.since = now;
    const isOver = detail.state === 'done' || detail.state === 'cancelled';
    const state = JSON.stringify([detail.state, detail.counts]);
    const isSame = files.length === 0 && state === this.toldState;
    this.toldState = state;
    return { event: isSame ? null : `id: ${now}\nevent: import\ndata: ${JSON.stringify({ ...detail, files })}\n\n`, isOver };
  }

  private read(): Promise<{ detail: ImportDetail; now: number }> {
    return this.db.transaction(
      async (tx) => {
        const { rows } = await tx.execute<{ now: string }>(sql`select floor(extract(epoch from clock_timestamp()) * 1000)::text as now`);
        const row = await getImportRow(tx, this.showId, this.id);
        const after = new Date(this.since - OVERLAP_MS).toISOString();
        const only = this.since > 0 ? sql`(f.state in ('queued', 'reading', 'measuring') or f.ended_at > ${after}::timestamptz)` : sql`true`;
        return { detail: { ...(await describeImport(tx, row)), files: await listImportFiles(tx, this.id, only) }, now: Number(rows[0].now) };
      },
      { isolationLevel: 'repeatable read', accessMode: 'read only' },
    );
  }

  private isNew(file: ImportFileAnswer): boolean {
    const mark = `${file.state} ${file.error?.code ?? ''} ${file.version ?? ''}`;
    if (this.told.get(file.name) === mark) return false;
    this.told.set(file.name, mark);
    return true;
  }
}

function eventStream(teller: ImportTeller, id: string, signal: AbortSignal): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let close = () => {};
  return new ReadableStream<Uint8Array>({
    start(controller) {
      let isBusy = false;
      let isDue = false;
      let isClosed = false;
      let pause: NodeJS.Timeout | undefined;
      const tell = async () => {
        if (isBusy) return void (isDue = true);
        isBusy = true;
        isDue = false;
        try {
          const { event, isOver } = await teller.next();
          if (isClosed) return;
          if (event !== null) controller.enqueue(encoder.encode(event));
          if (isOver) return close();
          // What happened while this was read and sent is told with the next second's news.
          pause = setTimeout(() => {
            isBusy = false;
            if (isDue) void tell();
          }, QUIET_MS);
        } catch (error) {
          log.warn({ err: error, importId: id }, 'an event stream ended early');
          close();
        }
      };
      const heartbeat = setInterval(() => !isClosed && controller.enqueue(encoder.encode(': still here\n\n')), HEARTBEAT_MS);
      const unsubscribe = onImportNotice(id, () => void tell());
      const forget = registerStream(() => close());
      close = () => {
        if (isClosed) return;
        isClosed = true;
        clearInterval(heartbeat);
        clearTimeout(pause);
        unsubscribe();
        forget();
        controller.close();
      };
      signal.addEventListener('abort', () => close());
      controller.enqueue(encoder.encode('retry: 2000\n\n'));
      void tell();
    },
    cancel() {
      close();
    },
  });
}
