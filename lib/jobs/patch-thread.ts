import { workerData } from 'node:worker_threads';
import { helpTeam } from '@/lib/engine/kernel/patch-team';

// A thread beside a measuring one: it computes blocks of patches from the shared memory that it was given until it is dismissed.
if (workerData instanceof SharedArrayBuffer) helpTeam(workerData);
