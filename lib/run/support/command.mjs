import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

/**
 * Runs a program to its end.
 * @param {string} program
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, input?: string, show?: boolean, silent?: boolean, onLine?: (line: string) => void, signal?: AbortSignal }} [options]
 *   show lets the output through to the terminal instead of collecting it; silent drops it
 * @returns {Promise<{ code: number, output: string, errors: string }>}
 */
export function command(program, args, options = {}) {
  const { cwd = root, env = process.env, input, show = false, silent = false, onLine, signal } = options;
  const out = silent ? 'ignore' : show ? 'inherit' : 'pipe';
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, {
      cwd,
      env,
      signal,
      stdio: [input === undefined ? 'ignore' : 'pipe', out, out],
    });
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
    child.once('error', reject);
    child.once('close', (code, killedBy) => resolve({ code: code ?? (killedBy ? 128 : 1), output, errors }));
    if (input !== undefined) child.stdin.end(input);
  });
}

/** Whether a program is on the PATH. */
export async function hasProgram(name) {
  const { code } = await command('sh', ['-c', 'command -v "$1"', 'sh', name], { cwd: '/' });
  return code === 0;
}
