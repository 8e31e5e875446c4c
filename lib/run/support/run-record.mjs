import { existsSync, readFileSync, readlinkSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { isAlive, tryLock } from './file-lock.mjs';
import { root } from './paths.mjs';
import { signalGroup } from './service.mjs';
import { Stop } from './stop.mjs';

const recordFile = (data) => path.join(data, 'run.json');
const lockFile = (data) => path.join(data, 'run.lock');

function readRecord(data) {
  try {
    return JSON.parse(readFileSync(recordFile(data), 'utf8'));
  } catch {
    return { pids: [], address: null };
  }
}

/** Whether a process with this number is one of this checkout's: numbers are given out again, and Next.js renames itself. */
function isOurs(pid) {
  try {
    return isAlive(pid) && readlinkSync(`/proc/${pid}/cwd`) === root;
  } catch {
    return false;
  }
}

/** The process number of the start that holds the data folder, or null. */
export function runningStart(data) {
  if (!existsSync(lockFile(data))) return null;
  const pid = Number(readFileSync(lockFile(data), 'utf8'));
  return isAlive(pid) ? pid : null;
}

/** Takes the data folder for this start, ending what a start that was killed has left running. */
export async function takeDataFolder(data) {
  if (!tryLock(lockFile(data))) {
    const { address } = readRecord(data);
    throw new Stop(`Weighhouse already runs on ${data}${address ? ` at ${address}` : ''} (process ${runningStart(data)}). Stop it first, or set WEIGHHOUSE_DATA to another folder.`);
  }
  const left = readRecord(data).pids.filter(isOurs);
  left.forEach((pid) => signalGroup(pid, 'SIGTERM'));
  for (let turn = 0; turn < 50 && left.some(isOurs); turn += 1) await wait(100);
  left.filter(isOurs).forEach((pid) => signalGroup(pid, 'SIGKILL'));
  return {
    write: (record) => writeFileSync(recordFile(data), JSON.stringify(record)),
    release: () => {
      rmSync(recordFile(data), { force: true });
      rmSync(lockFile(data), { force: true });
    },
  };
}
