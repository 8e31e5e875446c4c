import { Client } from 'pg';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { IMPORT_CHANNEL } from './notify-import';

/** A reader hears of one import at most this often. */
export const QUIET_MS = 1_000;
const RECONNECT_MS = 2_000;

type Reader = () => void;

/** The one listening connection of a process, and who waits for which import. */
class ImportNotices {
  private readonly readers = new Map<string, Set<Reader>>();
  private readonly due = new Map<string, NodeJS.Timeout>();
  private readonly last = new Map<string, number>();
  private client: Client | null = null;
  private connecting = false;

  subscribe(importId: string, reader: Reader): () => void {
    const set = this.readers.get(importId) ?? new Set();
    this.readers.set(importId, set.add(reader));
    void this.connect();
    return () => {
      set.delete(reader);
      if (set.size > 0 || this.readers.get(importId) !== set) return;
      this.readers.delete(importId);
      clearTimeout(this.due.get(importId));
      this.due.delete(importId);
      this.last.delete(importId);
      if (this.readers.size === 0) this.disconnect();
    };
  }

  private async connect(): Promise<void> {
    if (this.client || this.connecting) return;
    const url = config().appDatabaseUrl;
    if (!url) return;
    this.connecting = true;
    const client = new Client({ connectionString: url, application_name: 'weighhouse notices', keepAlive: true });
    client.on('notification', ({ payload }) => payload && this.hear(payload));
    client.on('error', (error) => this.lose(client, error));
    client.on('end', () => this.lose(client, null));
    try {
      await client.connect();
      await client.query(`listen ${IMPORT_CHANNEL}`);
      this.client = client;
      // What happened before this connection listened was not heard.
      for (const importId of this.readers.keys()) this.hear(importId);
    } catch (error) {
      this.lose(client, error);
    } finally {
      this.connecting = false;
      if (this.readers.size === 0) this.disconnect();
    }
  }

  private lose(client: Client, error: unknown): void {
    if (error) log.warn({ err: error }, 'the connection for notices was lost');
    if (this.client === client) this.client = null;
    client.removeAllListeners();
    client.on('error', () => undefined);
    void client.end().catch(() => undefined);
    if (this.readers.size > 0) setTimeout(() => void this.connect(), RECONNECT_MS).unref();
  }

  private disconnect(): void {
    const client = this.client;
    this.client = null;
    if (!client) return;
    client.removeAllListeners();
    client.on('error', () => undefined);
    void client.end().catch(() => undefined);
  }

  private hear(importId: string): void {
    if (!this.readers.has(importId) || this.due.has(importId)) return;
    const wait = Math.max(0, (this.last.get(importId) ?? 0) + QUIET_MS - Date.now());
    this.due.set(
      importId,
      setTimeout(() => {
        this.due.delete(importId);
        this.last.set(importId, Date.now());
        for (const reader of [...(this.readers.get(importId) ?? [])]) reader();
      }, wait),
    );
  }
}

const holder = globalThis as typeof globalThis & { weighhouseImportNotices?: ImportNotices };

/** Calls the reader after changes of the import, at most once a second. Answers how to stop. */
export function onImportNotice(importId: string, reader: Reader): () => void {
  holder.weighhouseImportNotices ??= new ImportNotices();
  return holder.weighhouseImportNotices.subscribe(importId, reader);
}
