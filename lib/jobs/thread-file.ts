import { fileURLToPath } from 'node:url';

/** Where a thread's program is and what Node must be told to run it: beside this module as source, beside the worker's bundle in production. */
export function threadFile(name: string): { filename: string; execArgv: string[] } {
  const asSource = import.meta.url.endsWith('.ts');
  return { filename: fileURLToPath(new URL(`./${name}${asSource ? '.ts' : '.mjs'}`, import.meta.url)), execArgv: asSource ? ['--import', 'tsx'] : [] };
}
