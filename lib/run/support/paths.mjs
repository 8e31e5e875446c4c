import { accessSync, constants, mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { Stop } from './stop.mjs';

/** The checkout's own folder, whatever the working directory is. */
export const root = fileURLToPath(new URL('../../../', import.meta.url)).replace(/\/$/, '');

/** A path inside the checkout. */
export const inRoot = (...parts) => path.join(root, ...parts);

/** The folder for database, files and secrets, made when it is not there. */
export function dataFolder() {
  const folder = path.resolve(root, process.env.WEIGHHOUSE_DATA || 'var');
  try {
    mkdirSync(folder, { recursive: true });
    accessSync(folder, constants.W_OK);
  } catch (error) {
    throw new Stop(`The data folder ${folder} cannot be written (${error.code}). Set WEIGHHOUSE_DATA to a folder that can.`);
  }
  return folder;
}
