import { useQueryClient } from '@tanstack/react-query';
import { useSession } from '../../api/session';
import { sessionEnd } from '../../api/session-end';
import { Dialog } from '../../components/dialog';
import { SignInForm } from './sign-in-form';

/** The session has ended while a page was open: signs in over it, so that nothing typed there is lost. */
export function SessionEndDialog() {
  const queryClient = useQueryClient();
  const { person } = useSession();
  return (
    <Dialog
      open
      onClose={sessionEnd.clear}
      title="Your session has ended"
      description="Sign in again; the page below stays as it is. What was being saved has to be saved once more."
    >
      <SignInForm
        onSignedIn={(now) => {
          // Somebody else begins afresh: nothing that the first person saw may stay.
          if (now.person?.id !== person?.id) return window.location.assign('/');
          sessionEnd.clear();
          void queryClient.invalidateQueries();
        }}
      />
    </Dialog>
  );
}
