import { command, hasProgram } from './command.mjs';
import { Stop } from './stop.mjs';

const aptOptions = ['-o', 'DPkg::Lock::Timeout=900', '-y', '-q', '--no-install-recommends'];

/** How this user may become root: nothing to add, `sudo -n`, or not at all. */
async function rootPrefix() {
  if (process.getuid?.() === 0) return [];
  if ((await hasProgram('sudo')) && (await command('sudo', ['-n', 'true'], { cwd: '/' })).code === 0) return ['sudo', '-n'];
  return null;
}

/**
 * Installs Debian packages, or stops with the command that somebody has to run.
 * @param {string[]} packages
 * @param {{ why: string, before?: string }} options why: what is missing, to open the sentence; before: a shell line to run first as root
 */
export async function installDebianPackages(packages, { why, before }) {
  const byHand = `apt-get update && apt-get install --no-install-recommends ${packages.join(' ')}`;
  if (!(await hasProgram('apt-get'))) {
    throw new Stop(`${why}, and this system has no apt-get. Install ${packages.join(' and ')} with its package manager, then start again.`);
  }
  const prefix = await rootPrefix();
  if (!prefix) {
    throw new Stop(`${why}, and this user may not install packages. As root run: ${byHand}`);
  }
  const asRoot = async (args) => {
    const [program, ...rest] = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', 'NEEDRESTART_MODE=a', ...args];
    return command(program, rest, { cwd: '/' });
  };
  if (before) await asRoot(['sh', '-c', before]);
  await asRoot(['apt-get', '-o', 'DPkg::Lock::Timeout=900', '-q', 'update']);
  const { code, errors } = await asRoot(['apt-get', ...aptOptions, 'install', ...packages]);
  if (code !== 0) {
    throw new Stop(`${why}, and installing failed: ${errors.trim().split('\n').pop()} As root run: ${byHand}`);
  }
}
