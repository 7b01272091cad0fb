// What every script of this folder prints: one plain line, never a stack trace for a known cause.

/** A known cause. Its message is the one line the person at the terminal reads. */
export class PlainError extends Error {}

/** Writes one progress line. */
export function say(line) {
  process.stdout.write(`${line}\n`);
}

/** Writes one line about a failure, with the name of the program before it. */
export function complain(line) {
  process.stderr.write(`strandline: ${line}\n`);
}

/**
 * Runs a script's main function; a PlainError ends it with its one line and exit code 1.
 * Anything else is a fault of ours and keeps its stack.
 */
export async function runScript(main) {
  // A closed pipe (`npm start | head`) must not take the database down half-way.
  process.stdout.on("error", () => {});
  process.stderr.on("error", () => {});
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    if (error instanceof PlainError) complain(error.message);
    else complain(`unexpected fault\n${error?.stack ?? error}`);
    process.exitCode = 1;
  }
}
