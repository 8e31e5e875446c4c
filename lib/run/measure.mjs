import path from 'node:path';
import process from 'node:process';
import { installDependencies } from './support/dependencies.mjs';
import { inRoot } from './support/paths.mjs';
import { runMain } from './support/stop.mjs';

// npm runs scripts in the checkout; file names on the command line are meant from where the person stands.
const standsIn = process.env.npm_lifecycle_event === 'measure' && process.env.INIT_CWD ? process.env.INIT_CWD : process.cwd();

await runMain(async () => {
  await installDependencies();
  const { register } = await import('tsx/esm/api');
  register({ tsconfig: inRoot('tsconfig.json') });
  const { measureFiles } = await import('./measure-cli.ts');
  return measureFiles(process.argv.slice(2), (file) => path.resolve(standsIn, file));
});
