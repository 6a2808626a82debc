import { Link } from 'react-router-dom';
import { useSession, useSignOut } from '../../api/session';
import { Button } from '../../components/button';
import { EmptyState } from '../../components/empty-state';
import { EntrySheet } from './entry-sheet';

/** The choice of a group for people who belong to several, or to none yet. */
export function GroupsPage() {
  const { person, memberships } = useSession();
  const signOut = useSignOut();
  return (
    <EntrySheet
      title="Choose a group"
      beside={
        <>
          <p>
            Each group has its own catalogues, verdicts and objects. You can change the group at any time in
            the top bar.
          </p>
          <p>{person === null ? null : `Signed in as ${person.name}.`}</p>
        </>
      }
    >
      {memberships.length === 0 ? (
        <EmptyState title="You belong to no group yet">
          Ask the owner of a group to add you with the e-mail address {person?.email}.
        </EmptyState>
      ) : (
        <ul className="grid gap-2">
          {memberships.map(({ group, name, role }) => (
            <li key={group}>
              <Link
                to={`/g/${group}/today`}
                className="flex items-baseline justify-between gap-4 border border-rule bg-raised p-3 no-underline hover:border-ink"
              >
                <span className="font-bold">{name}</span>
                <span className="text-muted">{role}</span>
              </Link>
            </li>
          ))}
        </ul>
      )}
      <div>
        <Button busy={signOut.isPending} onClick={() => signOut.mutate('here')}>
          Sign out
        </Button>
      </div>
    </EntrySheet>
  );
}
