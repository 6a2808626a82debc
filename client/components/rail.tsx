import { Link, NavLink } from 'react-router-dom';
import { classNames } from './class-names';
import { PLACES } from './places';

/** The list of places; the chosen one carries the same mark as a limit on the ruler. */
export function Rail({
  group,
  onChoose,
  withName = false,
}: {
  group: string;
  onChoose?: () => void;
  /** Begins with the name of the application. */
  withName?: boolean;
}) {
  return (
    <nav aria-label="Places" className="grid gap-4">
      {withName && (
        <Link to={`/g/${group}/today`} className="pl-[1.1875rem] text-lg font-bold text-ink no-underline">
          Idem
        </Link>
      )}
      <ul className="grid">
        {PLACES.map(({ path, name }) => (
          <li key={path}>
            <NavLink
              to={`/g/${group}/${path}`}
              onClick={onChoose}
              className={({ isActive }) =>
                classNames(
                  'flex min-h-9 items-center border-l-3 py-1.5 pr-3 pl-4 text-ink no-underline -outline-offset-2 hover:bg-sunken',
                  isActive ? 'border-accent font-bold' : 'border-transparent',
                )
              }
            >
              {name}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
