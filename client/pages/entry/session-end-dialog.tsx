import { useQueryClient } from '@tanstack/react-query';
import { sessionEnd } from '../../api/session-end';
import { Dialog } from '../../components/dialog';
import { SignInForm } from './sign-in-form';

/** The session has ended while a page was open: signs in over it, so that nothing typed there is lost. */
export function SessionEndDialog() {
  const queryClient = useQueryClient();
  return (
    <Dialog
      open
      onClose={sessionEnd.clear}
      title="Your session has ended"
      description="Sign in again; the page below stays as it is. What was being saved has to be saved once more."
    >
      <SignInForm
        onSignedIn={() => {
          sessionEnd.clear();
          void queryClient.invalidateQueries();
        }}
      />
    </Dialog>
  );
}
