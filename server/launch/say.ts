/** One line (or block) for the person at the terminal. */
export function say(text: string): void {
  process.stdout.write(`${text}\n`);
}

/** A problem told in words that a person can act on, without a stack trace. */
export class StartProblem extends Error {}
