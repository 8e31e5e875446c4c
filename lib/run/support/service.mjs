import { spawn } from 'node:child_process';
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, renameSync, statSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { root } from './paths.mjs';

const LARGEST_LOG_BYTES = 20 * 1024 * 1024;
const LONGEST_PAUSE_MS = 30_000;

/**
 * A long-running process of ours, started again when it ends by itself, its output in a log file.
 * @param {{ name: string, args: string[], env: NodeJS.ProcessEnv, logFolder: string, onChange?: () => void }} options
 *   args: of Node itself; onChange: called after every start and end
 */
export function startService({ name, args, env, logFolder, onChange = () => undefined }) {
  mkdirSync(logFolder, { recursive: true });
  const log = path.join(logFolder, `${name}.log`);
  if (existsSync(log) && statSync(log).size > LARGEST_LOG_BYTES) renameSync(log, `${log}.1`);
  const service = { name, log, pid: null, ends: 0, stop };
  let child = null;
  let isStopping = false;
  let pause = 500;

  function launch() {
    const output = openSync(log, 'a');
    const startedAt = Date.now();
    // A group of its own: Ctrl-C reaches only the start-up program, which ends the rest in order.
    child = spawn(process.execPath, args, { cwd: root, env, detached: true, stdio: ['ignore', output, output] });
    closeSync(output);
    service.pid = child.pid;
    onChange();
    child.once('exit', (code, signal) => {
      service.pid = null;
      service.ends += 1;
      onChange();
      if (isStopping) return;
      if (Date.now() - startedAt > 60_000) pause = 500;
      console.error(`The ${name} process ended (${signal ?? `code ${code}`}) and is started again; its log is ${log}.`);
      setTimeout(() => !isStopping && launch(), pause);
      pause = Math.min(pause * 2, LONGEST_PAUSE_MS);
    });
  }

  /** SIGTERM, and SIGKILL for what has not ended after the grace (milliseconds). */
  async function stop(graceMs = 12_000) {
    isStopping = true;
    if (!service.pid) return;
    const ended = new Promise((resolve) => child.once('exit', resolve));
    signalGroup(service.pid, 'SIGTERM');
    await Promise.race([ended, wait(graceMs, undefined, { ref: false })]);
    if (!service.pid) return;
    signalGroup(service.pid, 'SIGKILL');
    await ended;
  }

  launch();
  return service;
}

/** Sends a signal to a process and all that it started. */
export function signalGroup(pid, signal) {
  for (const target of [-pid, pid]) {
    try {
      process.kill(target, signal);
      return;
    } catch {
      // No such group: the process itself is tried next.
    }
  }
}

/** The last lines of a log, for a message about a start that failed. */
export function logTail(file, lines = 15) {
  return existsSync(file) ? readFileSync(file, 'utf8').trimEnd().split('\n').slice(-lines).join('\n') : '';
}
