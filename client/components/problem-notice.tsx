import { asProblem } from '../api/problem-error';
import { Button } from './button';

const SHOWN_ERRORS = 8;

/** A failure: what failed, the sentence, what to do, and the code to name when asking somebody. */
export function ProblemNotice({ problem: given, retry }: { problem: unknown; retry?: () => void }) {
  const problem = asProblem(given);
  const shown = problem.errors.slice(0, SHOWN_ERRORS);
  const more = problem.errors.length - shown.length;
  return (
    <div role="alert" className="grid justify-items-start gap-2 border border-l-4 border-bad bg-raised p-4">
      <p className="font-bold text-bad">
        <span aria-hidden="true">✕ </span>
        {problem.title}
      </p>
      <p>{problem.detail}</p>
      {shown.length > 0 && (
        <ul className="grid gap-1">
          {shown.map((one, index) => (
            <li key={index}>
              <span className="text-muted">{placeOf(one)}</span> {one.message}
            </li>
          ))}
          {more > 0 && <li className="text-muted">and {more} more</li>}
        </ul>
      )}
      {problem.hint !== undefined && <p className="prose-serif">{problem.hint}</p>}
      <div className="flex flex-wrap items-center gap-3">
        {retry !== undefined && <Button onClick={retry}>Try again</Button>}
        <span className="text-xs text-muted">Code: {problem.code}</span>
      </div>
    </div>
  );
}

function placeOf(error: { path: string; line?: number; column?: string }): string {
  const parts = [
    error.line === undefined ? '' : `line ${error.line}`,
    error.column === undefined ? '' : `column ${error.column}`,
    error.line === undefined && error.column === undefined ? error.path : '',
  ];
  const text = parts.filter((part) => part !== '').join(', ');
  return text === '' ? '' : `${text}:`;
}
