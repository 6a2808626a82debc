import { Link, useLocation, useRouteError } from 'react-router-dom';
import { ProblemNotice } from './problem-notice';

/** Shown in place of a page that could not be opened or that failed while it was drawn. */
export function RouteProblem() {
  const error = useRouteError();
  return (
    <div className="mx-auto grid max-w-2xl gap-4 p-4 sm:py-10">
      <title>Failed · Idem</title>
      <h1 className="text-xl font-bold">This page could not be shown</h1>
      <ProblemNotice problem={error} retry={() => window.location.reload()} />
      <p>
        <Link to="/">Go to the beginning</Link>
      </p>
    </div>
  );
}

/** An address that leads nowhere. */
export function NotFound() {
  const { pathname } = useLocation();
  return (
    <div className="mx-auto grid max-w-2xl gap-4 p-4 sm:py-10">
      <title>Not found · Idem</title>
      <h1 className="text-xl font-bold">There is no such page</h1>
      <p className="break-all">
        Nothing stands at <code>{pathname}</code>.
      </p>
      <p>
        <Link to="/">Go to the beginning</Link>
      </p>
    </div>
  );
}
