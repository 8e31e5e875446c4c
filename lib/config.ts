import path from 'node:path';
import { z } from 'zod';

const schema = z.object({
  NODE_ENV: z.enum(['development', 'production', 'test']).default('development'),
  /** Folder for files and secrets (and the database's cluster, when it is the checkout's own). */
  WEIGHHOUSE_DATA: z.string().min(1).default('var'),
  /** PostgreSQL as the application's role. */
  WEIGHHOUSE_APP_DATABASE_URL: z.string().min(1).optional(),
  /** PostgreSQL as the owner that migrates; also what an operator gives to use another server. */
  DATABASE_URL: z.string().min(1).optional(),
  NEXTAUTH_URL: z.string().url().optional(),
  NEXTAUTH_SECRET: z.string().min(16).optional(),
  /** smtp(s)://user:password@host:port; without it messages land in the local mailbox. */
  SMTP_URL: z.string().min(1).optional(),
  MAIL_FROM: z.string().min(3).default('Weighhouse <weighhouse@localhost>'),
  /** Hour of the day, in UTC, when daily digests go out. */
  WEIGHHOUSE_DIGEST_HOUR: z.coerce.number().int().min(0).max(23).default(7),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
  WEIGHHOUSE_MAX_FILE_BYTES: z.coerce.number().int().positive().default(2 * 1024 ** 3),
  WEIGHHOUSE_MAX_IMPORT_FILES: z.coerce.number().int().positive().default(20_000),
  WEIGHHOUSE_ENGINE_THREADS: z.coerce.number().int().positive().optional(),
});

function read() {
  // An empty value means unset: so a line of .env can be taken back for one process.
  const given = Object.entries(process.env).filter(([, value]) => value !== '');
  const parsed = schema.safeParse(Object.fromEntries(given));
  if (!parsed.success) {
    const first = parsed.error.issues[0];
    throw new Error(`Environment variable ${String(first.path[0])}: ${first.message}`);
  }
  const env = parsed.data;
  const dataFolder = path.resolve(/* turbopackIgnore: true */ env.WEIGHHOUSE_DATA);
  return {
    isProduction: env.NODE_ENV === 'production',
    dataFolder,
    filesFolder: path.join(dataFolder, 'files'),
    appDatabaseUrl: env.WEIGHHOUSE_APP_DATABASE_URL ?? env.DATABASE_URL ?? null,
    ownerDatabaseUrl: env.DATABASE_URL ?? null,
    baseUrl: env.NEXTAUTH_URL ?? 'http://127.0.0.1:3000',
    authSecret: env.NEXTAUTH_SECRET ?? null,
    smtpUrl: env.SMTP_URL ?? null,
    mailFrom: env.MAIL_FROM,
    digestHour: env.WEIGHHOUSE_DIGEST_HOUR,
    logLevel: env.LOG_LEVEL,
    maxFileBytes: env.WEIGHHOUSE_MAX_FILE_BYTES,
    maxImportFiles: env.WEIGHHOUSE_MAX_IMPORT_FILES,
    engineThreads: env.WEIGHHOUSE_ENGINE_THREADS ?? null,
  };
}

export type Config = ReturnType<typeof read>;

let cached: Config | null = null;

/** Settings of this process, read from the environment once. */
export function config(): Config {
  cached ??= read();
  return cached;
}
