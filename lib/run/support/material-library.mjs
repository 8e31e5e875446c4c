import { markDatabase } from './bootstrap.mjs';
import { command } from './command.mjs';
import { inRoot } from './paths.mjs';
import { Stop } from './stop.mjs';

/** Gives a database without the demo show the studio's material library, once; the demo brings it along. */
export async function seedMaterialLibrary({ marks, env, ownerUrl }) {
  if (marks.includes('demo') || marks.includes('materials')) return;
  const { code, output, errors } = await command(process.execPath, ['--import', 'tsx', inRoot('db/seed/run-materials.ts')], { env });
  if (code !== 0) throw new Stop(`The material library could not be stored:\n${(errors || output).trim()}`);
  await markDatabase(ownerUrl, 'materials');
}
