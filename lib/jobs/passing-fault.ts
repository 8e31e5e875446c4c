import { randomUUID } from 'node:crypto';
import { log } from '@/lib/log';

/** A fault that is not the file's: what it is called, and in plain words. */
export interface PassingFault {
  code: 'storage' | 'network' | 'disk_full' | 'database' | 'busy' | 'memory' | 'thread' | 'worker_lost' | 'unknown';
  message: string;
}

/** A measuring thread ran out of memory while it had neighbours: alone it may do. */
export class MemoryFault extends Error {
  constructor() {
    super('A measuring thread ran out of memory beside others.');
    this.name = 'MemoryFault';
  }
}

const WORDS: Record<Exclude<PassingFault['code'], 'unknown' | 'storage' | 'network'>, string> = {
  disk_full: 'A disk is full.',
  database: 'The database was out of reach.',
  busy: 'The database was busy with another change of the same rows.',
  memory: 'Measuring ran out of memory beside other files; it is tried again alone.',
  thread: 'The measuring thread ended before it was done.',
  worker_lost: 'The worker that measured it fell silent.',
};

export const LOST_WORKER: PassingFault = { code: 'worker_lost', message: WORDS.worker_lost };

/** Faults under which the file may have pulled others down with it, so that it is tried alone when they come again. */
export const isHeavy = (fault: PassingFault): boolean => fault.code === 'memory' || fault.code === 'worker_lost';

/** An error with those that caused it, outermost first. */
function chainOf(error: unknown): Error[] {
  const chain: Error[] = [];
  for (let one = error; one instanceof Error && chain.length < 8; one = one.cause) chain.push(one);
  return chain;
}

function codeOf(error: Error): string {
  const given = 'code' in error && typeof error.code === 'string' ? error.code : '';
  // What comes out of a thread has lost its code, but says it in its message.
  return given || (/^(?:\w+ )?(E[A-Z]{2,})\b/.exec(error.message)?.[1] ?? '');
}

const NETWORK = /^(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|ENOTFOUND|EHOSTUNREACH|ENETUNREACH|EAI_AGAIN)$/;

/** The classes of SQLSTATE that pass: connection, resources, operator, and changes that cross. */
function faultOfDatabase(code: string): PassingFault['code'] | null {
  if (code === '53100') return 'disk_full';
  if (/^(08|53|57|58)...$/.test(code)) return 'database';
  return /^(40...|55P03)$/.test(code) ? 'busy' : null;
}

/** What went wrong while a file was in hand, by the error that ended it. One that is not known is logged under the reference in its message. */
export function passingFaultOf(error: unknown): PassingFault {
  const known = (code: keyof typeof WORDS): PassingFault => ({ code, message: WORDS[code] });
  for (const one of chainOf(error)) {
    const code = codeOf(one);
    if (one instanceof MemoryFault) return known('memory');
    if (code === 'ENOSPC' || code === 'EDQUOT') return known('disk_full');
    const ofDatabase = faultOfDatabase(code);
    if (ofDatabase === 'disk_full' || ofDatabase === 'database' || ofDatabase === 'busy') return known(ofDatabase);
    if (/Connection terminated|Client has encountered a connection error|timeout exceeded when trying to connect/.test(one.message)) return known('database');
    if (one.name === 'AbortError' || /Worker (exited|terminated)|terminating worker thread/i.test(one.message)) return known('thread');
    if (NETWORK.test(code)) return { code: 'network', message: `Database or storage was out of reach (${code}).` };
    if ('syscall' in one || /^E[A-Z]{2,}$/.test(code)) return { code: 'storage', message: `The file could not be read from storage (${code || 'no reason given'}).` };
  }
  const reference = randomUUID();
  log.error({ err: error, reference }, 'a file met a fault that nobody foresaw');
  return { code: 'unknown', message: `Something broke on our side. Reference ${reference}.` };
}
