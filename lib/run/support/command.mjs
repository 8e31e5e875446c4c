import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

const running = new Set();

/** Ends the programs that still run, with all that they started. */
export function endCommands(signal = 'SIGTERM') {
  for (const child of running) {
    try {
      process.kill(-child.pid, signal);
    } catch {
      child.kill(signal);
    }
  }
}

/**
 * Runs a program to its end.
 * @param {string} program
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, input?: string, show?: boolean, silent?: boolean, onLine?: (line: string) => void }} [options]
 *   show lets the output through to the terminal instead of collecting it; silent drops it
 * @returns {Promise<{ code: number, output: string, errors: string }>}
 */
export function command(program, args, options = {}) {
  const { cwd = root, env = process.env, input, show = false, silent = false, onLine } = options;
  const out = silent ? 'ignore' : show ? 'inherit' : 'pipe';
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, {
      cwd,
      env,
      // A group of its own: Ctrl-C reaches only the start-up program, which ends the rest in order.
      detached: true,
      stdio: [input === undefined ? 'ignore' : 'pipe', out, out],
    });
    running.add(child);
    let output = '';
    let errors = '';
    let rest = '';
    child.stdout?.setEncoding('utf8').on('data', (chunk) => {
      output += chunk;
      if (!onLine) return;
      const lines = (rest + chunk).split('\n');
      rest = lines.pop();
      lines.forEach(onLine);
    });
    child.stderr?.setEncoding('utf8').on('data', (chunk) => (errors += chunk));
    child.once('error', (error) => {
      running.delete(child);
      reject(error);
    });
    child.once('close', (code, killedBy) => {
      running.delete(child);
      resolve({ code: code ?? (killedBy ? 128 : 1), output, errors });
    });
    if (input !== undefined) child.stdin.end(input);
  });
}

/** Whether a program is on the PATH. */
export async function hasProgram(name) {
  const { code } = await command('sh', ['-c', 'command -v "$1"', 'sh', name], { cwd: '/' });
  return code === 0;
}
