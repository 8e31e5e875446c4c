import path from 'node:path';
import process from 'node:process';
import { register } from 'tsx/esm/api';
import { inRoot } from './support/paths.mjs';

// npm runs scripts in the checkout; file names on the command line are meant from where the person stands.
const standsIn = process.env.npm_lifecycle_event === 'measure' && process.env.INIT_CWD ? process.env.INIT_CWD : process.cwd();

register({ tsconfig: inRoot('tsconfig.json') });
const { measureFiles } = await import('./measure-cli.ts');
process.exitCode = await measureFiles(process.argv.slice(2), (file) => path.resolve(standsIn, file));
