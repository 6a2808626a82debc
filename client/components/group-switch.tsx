import { Link, useLocation } from 'react-router-dom';
import { useSession } from '../api/session';
import { placeInGroup } from './places';

/** The person's groups; choosing one leads to the same place there. */
export function GroupSwitch({ current, onChoose }: { current: string; onChoose: () => void }) {
  const { memberships } = useSession();
  const { pathname } = useLocation();
  return (
    <div className="grid gap-2">
      <p className="text-xs font-bold text-muted">Your groups</p>
      <ul className="grid gap-1">
        {memberships.map(({ group, name, role }) => (
          <li key={group}>
            <Link
              to={placeInGroup(pathname, group)}
              onClick={onChoose}
              aria-current={group === current || undefined}
              className="flex min-h-8 items-center justify-between gap-4 no-underline hover:underline"
            >
              <span className={group === current ? 'font-bold text-ink' : ''}>{name}</span>
              <span className="text-xs text-muted">{role}</span>
            </Link>
          </li>
        ))}
      </ul>
    </div>
  );
}
