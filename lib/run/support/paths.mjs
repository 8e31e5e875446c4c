import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout's own folder, whatever the working directory is. */
export const root = fileURLToPath(new URL('../../../', import.meta.url)).replace(/\/$/, '');

/** A path inside the checkout. */
export const inRoot = (...parts) => path.join(root, ...parts);

/** The folder for database, files and secrets. */
export function dataFolder() {
  return path.resolve(root, process.env.WEIGHHOUSE_DATA || 'var');
}
