import { hasProgram } from './command.mjs';
import { installDebianPackages } from './debian-packages.mjs';

/** Makes sure of python3, with which tests check exported rows by a program in another language. */
export async function python() {
  if (await hasProgram('python3')) return;
  await installDebianPackages(['python3'], { why: 'Python for the tests of exported rows is not installed' });
}
