import { useNavigate, useSearchParams } from 'react-router-dom';
import { safeBack } from '../../api/guards';
import { EntrySheet } from './entry-sheet';
import { SignInForm } from './sign-in-form';

/** The way in for people with an account; leads back to the address that asked for a sign-in. */
export function SignInPage() {
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const back = safeBack(search.get('back')) ?? '/';
  return (
    <EntrySheet
      title="Sign in"
      beside={
        <>
          <p>
            Idem keeps one record per object for a research group: under every name, from every catalogue,
            with the reason for each identity.
          </p>
          <p>
            Accounts are made by the owner of your group. Ask there when you have none, or forgot your
            password.
          </p>
        </>
      }
    >
      <SignInForm onSignedIn={() => void navigate(back, { replace: true })} />
    </EntrySheet>
  );
}
