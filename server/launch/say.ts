import { ClusterProblem } from '../../db/cluster-problem';

/** One line (or block) for the person at the terminal. */
export function say(text: string): void {
  process.stdout.write(`${text}\n`);
}

/** A problem told in words that a person can act on, without a stack trace. */
export class StartProblem extends Error {}

/** Tells what went wrong: plain words for what a person can act on, the whole stack for a fault of the program. */
export function tell(problem: unknown): void {
  if (problem instanceof StartProblem || problem instanceof ClusterProblem) say(problem.message);
  else say(problem instanceof Error ? (problem.stack ?? problem.message) : String(problem));
}
