/** A reason to stop that the person at the terminal can act on: its message is a sentence, shown without a stack. */
export class Stop extends Error {
  name = 'Stop';
}

/**
 * Runs a command's main function; a Stop ends the process with its sentence, anything else with its stack.
 * @param {() => Promise<number | void>} main resolves to the exit code
 */
export async function runMain(main) {
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    console.error(error instanceof Stop ? error.message : error);
    process.exitCode = 1;
  }
}
