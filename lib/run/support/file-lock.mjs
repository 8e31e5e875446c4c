import { closeSync, mkdirSync, openSync, readFileSync, rmSync, writeSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';

/** Whether a process with this number runs (also one of another user); one that ended and nobody asked after does not. */
export function isAlive(pid) {
  if (!Number.isInteger(pid) || pid <= 0) return false;
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (error.code !== 'EPERM') return false;
  }
  try {
    // The state follows the name, which may itself hold a parenthesis.
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.charAt(stat.lastIndexOf(')') + 2) !== 'Z';
  } catch {
    return true;
  }
}

/** Takes the file for this process; false when a living process holds it. A dead holder's file is taken over. */
export function tryLock(file) {
  mkdirSync(path.dirname(file), { recursive: true });
  try {
    const handle = openSync(file, 'wx', 0o600);
    writeSync(handle, String(process.pid));
    closeSync(handle);
    return true;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
  }
  let holder = NaN;
  try {
    holder = Number.parseInt(readFileSync(file, 'utf8'), 10);
  } catch {
    return false;
  }
  if (holder === process.pid) return true;
  if (isAlive(holder) || Number.isNaN(holder)) return false;
  rmSync(file, { force: true });
  return tryLock(file);
}

/** Runs `act` while holding the file, waiting up to a minute for another process to let go of it. */
export async function withLock(file, act) {
  const limit = Date.now() + 60_000;
  while (!tryLock(file)) {
    if (Date.now() > limit) throw new Error(`${file} stays locked; remove it if no other start is going on.`);
    await wait(100);
  }
  try {
    return await act();
  } finally {
    rmSync(file, { force: true });
  }
}
