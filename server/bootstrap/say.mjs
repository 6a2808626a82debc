/** Set-up messages go to standard error, so that a command's own output stays clean. */
export function say(text) {
  process.stderr.write(`${text}\n`);
}

/** A problem that the person at the keyboard can solve; its message is all they need. */
export class SetupProblem extends Error {}

/** Runs a set-up; a SetupProblem is told in plain words, without a stack trace, and ends the process with 1. */
export async function orExplain(work) {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof SetupProblem)) throw error;
    say(error.message);
    process.exit(1);
  }
}
