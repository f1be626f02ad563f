/**
 * An error whose message is one sentence for the person at the keyboard: what is wrong and what to
 * do. Scripts print it without a stack trace; every other error keeps its trace.
 */
export class SentenceError extends Error {}

/** Runs a script's main function and turns its failure into exit code 1 with a readable message. */
export async function runScript(main) {
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    console.error(error instanceof SentenceError ? error.message : error);
    process.exitCode = 1;
  }
}
