import { NavLink } from 'react-router-dom';
import { classNames } from './class-names';
import { PLACES } from './places';

/** The list of places; the chosen one carries the same mark as a limit on the ruler. */
export function Rail({ group, onChoose }: { group: string; onChoose?: () => void }) {
  return (
    <nav aria-label="Places">
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
