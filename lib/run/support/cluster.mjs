import { createHash } from 'node:crypto';
import { chmodSync, chownSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { command } from './command.mjs';
import { isAlive } from './file-lock.mjs';
import { freePort } from './free-port.mjs';
import { findPostgresPrograms, postgresPrograms } from './postgres-programs.mjs';
import { Stop } from './stop.mjs';

const isRoot = () => process.getuid?.() === 0;

/** Runs a PostgreSQL program as the user that owns the cluster: postgres when this is root, else this user. */
async function asClusterUser(program, args, options = {}) {
  // From /, because the postgres user may not be able to enter the working directory.
  if (!isRoot()) return command(program, args, { cwd: '/', ...options });
  return command('runuser', ['-u', 'postgres', '--', program, ...args], { cwd: '/', ...options });
}

/** Where the cluster lies: the folder wished for, or one under /var/tmp named for it when postgres cannot reach it. */
async function reachableFolder(wished) {
  if (!isRoot()) return wished;
  mkdirSync(path.dirname(wished), { recursive: true });
  const { code } = await asClusterUser('test', ['-x', path.dirname(wished)]);
  if (code === 0) return wished;
  return path.join('/var/tmp', `weighhouse-${createHash('sha256').update(wished).digest('hex').slice(0, 16)}`);
}

function giveToClusterUser(...paths) {
  if (!isRoot()) return;
  const [, , uid, gid] = readFileSync('/etc/passwd', 'utf8').split('\n').find((line) => line.startsWith('postgres:')).split(':');
  for (const one of paths) chownSync(one, Number(uid), Number(gid));
}

/** The port of the server that runs on this folder, or null. A pid file whose process is not PostgreSQL is removed. */
function runningPort(data) {
  const file = path.join(data, 'postmaster.pid');
  if (!existsSync(file)) return null;
  const [pid, , , port] = readFileSync(file, 'utf8').split('\n');
  let name = '';
  try {
    name = readFileSync(`/proc/${Number(pid)}/comm`, 'utf8').trim();
  } catch {
    name = '';
  }
  if (name === 'postgres' && isAlive(Number(pid))) return Number(port) || null;
  // After a power cut the number may belong to another program, and PostgreSQL would refuse to start.
  rmSync(file, { force: true });
  return null;
}

async function initialise(programs, folder, superuserPassword, throwAway) {
  const data = path.join(folder, 'data');
  rmSync(data, { recursive: true, force: true });
  const passwordFolder = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-'));
  const passwordFile = path.join(passwordFolder, 'password');
  writeFileSync(passwordFile, superuserPassword, { mode: 0o600 });
  giveToClusterUser(passwordFolder, passwordFile);
  const initdb = path.join(programs, 'initdb');
  const args = ['-D', data, '-U', 'postgres', '-A', 'scram-sha-256', '--encoding=UTF8', '--locale=C.UTF-8', `--pwfile=${passwordFile}`];
  const { code, errors } = await asClusterUser(initdb, throwAway ? [...args, '--no-sync'] : args);
  rmSync(passwordFolder, { recursive: true, force: true });
  if (code !== 0) throw new Stop(`PostgreSQL could not make its data folder ${data}: ${errors.trim().split('\n').pop()}`);
  const settings = ["listen_addresses = '127.0.0.1'", "unix_socket_directories = ''", 'max_connections = 100', 'log_timezone = UTC', 'timezone = UTC'];
  if (throwAway) settings.push('fsync = off', 'synchronous_commit = off', 'full_page_writes = off', 'max_wal_size = 256MB');
  writeFileSync(path.join(data, 'postgresql.auto.conf'), settings.join('\n') + '\n');
  writeFileSync(path.join(folder, 'made'), `${new Date().toISOString()}\n`);
}

async function stopServer(pgCtl, data) {
  const ended = await asClusterUser(pgCtl, ['stop', '-D', data, '-m', 'fast', '-w', '-t', '30']);
  if (ended.code !== 0 && runningPort(data)) await asClusterUser(pgCtl, ['stop', '-D', data, '-m', 'immediate', '-w', '-t', '30']);
}

/** Stops the cluster of this folder if it runs, and with `remove` deletes it, wherever it had to be put. */
export async function endCluster({ folder: wished, remove = false }) {
  const folder = await reachableFolder(wished);
  const data = path.join(folder, 'data');
  const programs = findPostgresPrograms();
  if (programs && runningPort(data)) await stopServer(path.join(programs, 'pg_ctl'), data);
  if (remove) rmSync(folder, { recursive: true, force: true });
}

/**
 * Makes (once) and starts a PostgreSQL cluster of our own that listens on the loopback address alone.
 * @param {{ folder: string, superuserPassword: string, throwAway?: boolean }} options
 *   throwAway: speed before safety, for test data
 * @returns {Promise<{ port: number, stop: () => Promise<void>, wasRunning: boolean, folder: string }>}
 */
export async function startCluster({ folder: wished, superuserPassword, throwAway = false }) {
  await postgresPrograms();
  const folder = await reachableFolder(wished);
  const data = path.join(folder, 'data');
  const isMade = existsSync(path.join(folder, 'made'));
  const version = isMade ? readFileSync(path.join(data, 'PG_VERSION'), 'utf8').trim() : null;
  const programs = findPostgresPrograms(version);
  if (!programs) {
    throw new Stop(`The data in ${data} was written by PostgreSQL ${version}, which is not installed. Install postgresql-${version}, or move the data with pg_upgrade.`);
  }
  const pgCtl = path.join(programs, 'pg_ctl');
  const stop = () => stopServer(pgCtl, data);
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  chmodSync(folder, 0o700);
  giveToClusterUser(folder);
  if (!isMade) await initialise(programs, folder, superuserPassword, throwAway);
  const already = runningPort(data);
  if (already) return { port: already, stop, wasRunning: true, folder };
  const log = path.join(folder, 'log');
  const portFile = path.join(folder, 'port');
  let port = await freePort(existsSync(portFile) ? Number(readFileSync(portFile, 'utf8')) : undefined);
  for (let attempt = 1; ; attempt += 1) {
    // Its output goes to the log file: a pipe would stay open for as long as the server runs.
    const { code } = await asClusterUser(pgCtl, ['start', '-D', data, '-w', '-t', '120', '-s', '-l', log, '-o', `-p ${port}`], { silent: true });
    if (code === 0) break;
    const last = existsSync(log) ? readFileSync(log, 'utf8').trim().split('\n').slice(-5).join('\n') : 'no log was written';
    // Somebody may have taken the port since it was found free.
    if (attempt === 3 || !/address already in use|could not bind/i.test(last)) throw new Stop(`PostgreSQL did not start (log: ${log}):\n${last}`);
    port = await freePort();
  }
  writeFileSync(portFile, String(port));
  return { port, stop, wasRunning: false, folder };
}
