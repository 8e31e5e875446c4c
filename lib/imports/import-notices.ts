import { Client } from 'pg';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { IMPORT_CHANNEL, SESSIONS_CHANNEL } from './notify-import';

/** A reader hears of one import at most this often. */
export const QUIET_MS = 1_000;
const RECONNECT_MS = 2_000;
const READY_MS = 5_000;

type Reader = () => void;

/** The one listening connection of a process, and who waits for which import or for whose signing out. */
class ImportNotices {
  private readonly readers = new Map<string, Set<Reader>>();
  private readonly due = new Map<string, NodeJS.Timeout>();
  private readonly last = new Map<string, number>();
  private client: Client | null = null;
  private connecting = false;
  private wasLost = false;
  private waiting: (() => void)[] = [];

  /** Resolves once this process listens, or after a while without a database that answers. */
  ready(): Promise<void> {
    if (this.client) return Promise.resolve();
    return new Promise((resolve) => {
      this.waiting.push(resolve);
      setTimeout(resolve, READY_MS).unref();
      void this.connect();
    });
  }

  subscribe(key: string, reader: Reader): () => void {
    const set = this.readers.get(key) ?? new Set();
    this.readers.set(key, set.add(reader));
    void this.connect();
    return () => {
      set.delete(reader);
      if (set.size > 0 || this.readers.get(key) !== set) return;
      this.readers.delete(key);
      clearTimeout(this.due.get(key));
      this.due.delete(key);
      this.last.delete(key);
      if (this.readers.size === 0) this.disconnect();
    };
  }

  private async connect(): Promise<void> {
    if (this.client || this.connecting) return;
    const url = config().appDatabaseUrl;
    if (!url) return;
    this.connecting = true;
    const client = new Client({ connectionString: url, application_name: 'weighhouse notices', keepAlive: true });
    client.on('notification', ({ channel, payload }) => {
      if (!payload) return;
      if (channel === SESSIONS_CHANNEL) this.tell(sessionKey(payload));
      else this.hear(importKey(payload));
    });
    client.on('error', (error) => this.lose(client, error));
    client.on('end', () => this.lose(client, null));
    try {
      await client.connect();
      await client.query(`listen ${IMPORT_CHANNEL}; listen ${SESSIONS_CHANNEL}`);
      this.client = client;
      for (const resolve of this.waiting.splice(0)) resolve();
      // What happened before this connection listened was not heard. Streams that just began need not end for that.
      for (const key of this.readers.keys()) if (this.wasLost || !key.startsWith(SESSION)) this.hear(key);
      this.wasLost = false;
    } catch (error) {
      this.lose(client, error);
    } finally {
      this.connecting = false;
      if (this.readers.size === 0) this.disconnect();
    }
  }

  private lose(client: Client, error: unknown): void {
    if (error) log.warn({ err: error }, 'the connection for notices was lost');
    if (this.client === client) {
      this.client = null;
      this.wasLost = true;
    }
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

  private hear(key: string): void {
    if (!this.readers.has(key) || this.due.has(key)) return;
    const wait = Math.max(0, (this.last.get(key) ?? 0) + QUIET_MS - Date.now());
    this.due.set(
      key,
      setTimeout(() => {
        this.due.delete(key);
        this.last.set(key, Date.now());
        this.tell(key);
      }, wait),
    );
  }

  private tell(key: string): void {
    for (const reader of [...(this.readers.get(key) ?? [])]) reader();
  }
}

const importKey = (importId: string): string => `import:${importId}`;
const SESSION = 'user:';
const sessionKey = (userId: string): string => `${SESSION}${userId}`;

const holder = globalThis as typeof globalThis & { weighhouseImportNotices?: ImportNotices };

function notices(): ImportNotices {
  return (holder.weighhouseImportNotices ??= new ImportNotices());
}

/** Calls the reader after changes of the import, at most once a second. Answers how to stop. */
export function onImportNotice(importId: string, reader: Reader): () => void {
  return notices().subscribe(importKey(importId), reader);
}

/** Calls the reader when this person signs out in some browser, and after a time in which that could not be heard. Answers how to stop. */
export function onSignOut(userId: string, reader: Reader): () => void {
  return notices().subscribe(sessionKey(userId), reader);
}

/** Resolves once changes are heard: what is read after that misses none. */
export function noticesReady(): Promise<void> {
  return notices().ready();
}
