import { useSession, useSignOut } from '../api/session';
import { Button } from './button';
import { ProblemNotice } from './problem-notice';

/** Who is signed in, and the two ways out. */
export function AccountMenu({ onKeys }: { onKeys: () => void }) {
  const { person } = useSession();
  const signOut = useSignOut();
  return (
    <div className="grid gap-3">
      {person !== null && (
        <p className="grid">
          <span className="font-bold">{person.name}</span>
          <span className="text-xs break-all text-muted">{person.email}</span>
        </p>
      )}
      <Button onClick={onKeys}>Keys of this page</Button>
      <Button busy={signOut.isPending && signOut.variables === 'here'} onClick={() => signOut.mutate('here')}>
        Sign out
      </Button>
      <Button
        kind="bad"
        busy={signOut.isPending && signOut.variables === 'everywhere'}
        onClick={() => signOut.mutate('everywhere')}
      >
        Sign out everywhere
      </Button>
      {signOut.error !== null && <ProblemNotice problem={signOut.error} />}
    </div>
  );
}
