/** A file in a worker's hand. */
export interface FileInHand {
  file: string;
  show: string;
  import: string;
  state: 'queued' | 'reading' | 'measuring';
  attempt: number;
  /** When it was begun; null while it waits behind another file of the same turn. */
  since: string | null;
}

/** A worker process, wherever it runs. */
export interface WorkerState {
  name: string;
  threads: number;
  memory_bytes: number;
  started_at: string;
  /** Whether it was heard of lately. */
  alive: boolean;
  files: FileInHand[];
}

export interface WaitingShow {
  show: string;
  files: number;
  paused_files: number;
  /** When the first of them began to wait. */
  since: string;
}

/** One try that ended in a fault which may pass. */
export interface FaultAnswer {
  at: string;
  attempt: number;
  worker: string | null;
  message: string;
}

/** A file that is put off after a fault, or was given up. */
export interface TroubledFile {
  file: string;
  show: string;
  import: string;
  /** In plain words. */
  reason: string;
  /** When it is tried again; null once it was given up. */
  again_at: string | null;
  at: string;
  faults: FaultAnswer[];
}

/** What waits, who works, and what went wrong through no fault of a file's. */
export interface QueueState {
  waiting_files: number;
  oldest_waiting_s: number | null;
  workers: WorkerState[];
  shows: WaitingShow[];
  put_off: TroubledFile[];
  given_up: TroubledFile[];
}
