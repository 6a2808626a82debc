import type { FieldPath, FieldValues, UseFormSetError } from 'react-hook-form';
import { asProblem, type ProblemError } from '../api/problem-error';

/**
 * Puts the field errors of a refused request beside their fields. Returns the problem when something is left to
 * show as a whole: no field was named, or a named one is not in this form.
 */
export function showProblemInForm<V extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<V>,
  fields: readonly FieldPath<V>[],
): ProblemError | null {
  const problem = asProblem(error);
  let left = problem.errors.length === 0;
  let focus = true;
  for (const { path, message } of problem.errors) {
    const field = fields.find((name) => path === name);
    if (field === undefined) {
      left = true;
      continue;
    }
    setError(field, { type: 'server', message }, { shouldFocus: focus });
    focus = false;
  }
  return left ? problem : null;
}
