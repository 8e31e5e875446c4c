import { parentPort, workerData } from 'node:worker_threads';
import { help, runRow, type RowTask } from './bench-row';

// A process of its own for each row, so that neither its memory nor its compiled code is that of another: the task as JSON on the command line, the answer
// as JSON on stdout. The same file is the helper's thread.
if (parentPort !== null && workerData instanceof SharedArrayBuffer) help(workerData, () => parentPort?.postMessage('ready'));
else process.stdout.write(JSON.stringify(await runRow(JSON.parse(process.argv[2]) as RowTask)));
