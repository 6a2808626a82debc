import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { zodResolver } from '@hookform/resolvers/zod';
import { signIn, type SessionState } from '../../../shared/schemas/session';
import { asProblem, type ProblemError } from '../../api/problem-error';
import { useSignIn } from '../../api/session';
import { Button } from '../../components/button';
import { showProblemInForm } from '../../components/form-problem';
import { ProblemNotice } from '../../components/problem-notice';
import { TextField } from '../../components/text-field';

/** E-mail and password; what was typed stays when the server refuses. */
export function SignInForm({ onSignedIn }: { onSignedIn: (session: SessionState) => void }) {
  const mutation = useSignIn();
  const [problem, setProblem] = useState<ProblemError | null>(null);
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(signIn),
    defaultValues: { email: '', password: '' },
  });
  const submit = handleSubmit(async (values) => {
    setProblem(null);
    try {
      onSignedIn(await mutation.mutateAsync(values));
    } catch (error) {
      setProblem(showProblemInForm(asProblem(error), setError, ['email', 'password']));
    }
  });
  const { errors, isSubmitting } = formState;
  return (
    <form noValidate className="grid max-w-md gap-4" onSubmit={(event) => void submit(event)}>
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        error={errors.email?.message}
        {...register('email')}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="current-password"
        error={errors.password?.message}
        {...register('password')}
      />
      {problem !== null && <ProblemNotice problem={problem} />}
      <div>
        <Button type="submit" kind="main" busy={isSubmitting} busyLabel="Signing in">
          Sign in
        </Button>
      </div>
    </form>
  );
}
