import path from 'node:path';
import { z } from 'zod';

/** Every variable that is read, with its default; .env.example is held to it. */
export const environmentSchema = z.object({
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
  /** Minutes from which an import counts as long, so that its end is written to whoever opened it. */
  WEIGHHOUSE_LONG_IMPORT_MINUTES: z.coerce.number().min(0).default(5),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
  WEIGHHOUSE_MAX_FILE_BYTES: z.coerce.number().int().positive().default(2 * 1024 ** 3),
  WEIGHHOUSE_MAX_IMPORT_FILES: z.coerce.number().int().positive().default(20_000),
  WEIGHHOUSE_MAX_IMPORT_BYTES: z.coerce.number().int().positive().default(200 * 1024 ** 3),
  /** Content of one show, and of all shows together; the same content counts once in each. */
  WEIGHHOUSE_MAX_SHOW_BYTES: z.coerce.number().int().positive().default(1024 ** 4),
  WEIGHHOUSE_MAX_STUDIO_BYTES: z.coerce.number().int().positive().default(4 * 1024 ** 4),
  /** How long the parts of an unfinished upload are kept after the last one came. */
  WEIGHHOUSE_UPLOAD_HOURS: z.coerce.number().positive().max(24 * 365).default(72),
  /** How long stored bytes stay that nothing refers to. Not shorter than two hours: what is being registered must not be swept. */
  WEIGHHOUSE_ORPHAN_HOURS: z.coerce.number().min(2).default(48),
  /** A bucket puts files into S3 in place of the data folder. */
  WEIGHHOUSE_S3_BUCKET: z.string().min(1).optional(),
  WEIGHHOUSE_S3_ENDPOINT: z.string().url().optional(),
  WEIGHHOUSE_S3_REGION: z.string().min(1).default('us-east-1'),
  /** Without keys the environment's own are used: a role of the machine, a shared file. */
  WEIGHHOUSE_S3_ACCESS_KEY: z.string().min(1).optional(),
  WEIGHHOUSE_S3_SECRET_KEY: z.string().min(1).optional(),
  WEIGHHOUSE_S3_PATH_STYLE: z.enum(['0', '1']).default('0'),
  /** What a dropped ZIP may hold: entries, bytes unpacked in all, bytes unpacked from one packed byte, and archives within archives how deep. */
  WEIGHHOUSE_ARCHIVE_MAX_ENTRIES: z.coerce.number().int().positive().default(20_000),
  WEIGHHOUSE_ARCHIVE_MAX_BYTES: z.coerce.number().int().positive().default(64 * 1024 ** 3),
  WEIGHHOUSE_ARCHIVE_MAX_RATIO: z.coerce.number().positive().default(200),
  WEIGHHOUSE_ARCHIVE_NESTING: z.coerce.number().int().min(0).max(8).default(0),
  WEIGHHOUSE_ENGINE_THREADS: z.coerce.number().int().positive().optional(),
  /** Bytes that a worker may measure in at once. */
  WEIGHHOUSE_WORKER_MEMORY: z.coerce.number().int().min(256 * 1024 ** 2).optional(),
  /** What a worker is called on the admin's page. */
  WEIGHHOUSE_WORKER_NAME: z.string().min(1).max(80).optional(),
});

function s3Of(env: z.infer<typeof environmentSchema>, bucket: string) {
  const { WEIGHHOUSE_S3_ACCESS_KEY: accessKeyId, WEIGHHOUSE_S3_SECRET_KEY: secretAccessKey } = env;
  if ((accessKeyId === undefined) !== (secretAccessKey === undefined)) throw new Error('WEIGHHOUSE_S3_ACCESS_KEY and WEIGHHOUSE_S3_SECRET_KEY: give both or neither.');
  return {
    bucket,
    endpoint: env.WEIGHHOUSE_S3_ENDPOINT ?? null,
    region: env.WEIGHHOUSE_S3_REGION,
    keys: accessKeyId !== undefined && secretAccessKey !== undefined ? { accessKeyId, secretAccessKey } : null,
    pathStyle: env.WEIGHHOUSE_S3_PATH_STYLE === '1',
  };
}

function read() {
  // An empty value means unset: so a line of .env can be taken back for one process.
  const given = Object.entries(process.env).filter(([, value]) => value !== '');
  const parsed = environmentSchema.safeParse(Object.fromEntries(given));
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
    longImportMinutes: env.WEIGHHOUSE_LONG_IMPORT_MINUTES,
    logLevel: env.LOG_LEVEL,
    maxFileBytes: env.WEIGHHOUSE_MAX_FILE_BYTES,
    maxImportFiles: env.WEIGHHOUSE_MAX_IMPORT_FILES,
    maxImportBytes: env.WEIGHHOUSE_MAX_IMPORT_BYTES,
    maxShowBytes: env.WEIGHHOUSE_MAX_SHOW_BYTES,
    maxStudioBytes: env.WEIGHHOUSE_MAX_STUDIO_BYTES,
    uploadHours: env.WEIGHHOUSE_UPLOAD_HOURS,
    orphanHours: env.WEIGHHOUSE_ORPHAN_HOURS,
    s3: env.WEIGHHOUSE_S3_BUCKET === undefined ? null : s3Of(env, env.WEIGHHOUSE_S3_BUCKET),
    archive: {
      entries: env.WEIGHHOUSE_ARCHIVE_MAX_ENTRIES,
      totalBytes: env.WEIGHHOUSE_ARCHIVE_MAX_BYTES,
      ratio: env.WEIGHHOUSE_ARCHIVE_MAX_RATIO,
      nesting: env.WEIGHHOUSE_ARCHIVE_NESTING,
    },
    engineThreads: env.WEIGHHOUSE_ENGINE_THREADS ?? null,
    workerMemory: env.WEIGHHOUSE_WORKER_MEMORY ?? null,
    workerName: env.WEIGHHOUSE_WORKER_NAME ?? null,
  };
}

export type Config = ReturnType<typeof read>;

let cached: Config | null = null;

/** Settings of this process, read from the environment once. */
export function config(): Config {
  cached ??= read();
  return cached;
}
