import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import { zodResolver } from '@hookform/resolvers/zod';
import { setUp } from '../../../shared/schemas/session';
import { asProblem, type ProblemError } from '../../api/problem-error';
import { useSetUp } from '../../api/session';
import { Button } from '../../components/button';
import { showProblemInForm } from '../../components/form-problem';
import { ProblemNotice } from '../../components/problem-notice';
import { TextField } from '../../components/text-field';
import { EntrySheet } from './entry-sheet';

/** The first page of an empty installation: makes the owner's account and the first group. */
export function SetUpPage() {
  const navigate = useNavigate();
  return (
    <EntrySheet
      title="Set up this installation"
      beside={
        <>
          <p>There is no account here yet. The first one owns the first group and can add everybody else.</p>
          <p>
            A group shares its catalogues, verdicts and objects. Nothing of it is visible to other groups on
            this server.
          </p>
        </>
      }
    >
      <SetUpForm onDone={() => void navigate('/', { replace: true })} />
    </EntrySheet>
  );
}

function SetUpForm({ onDone }: { onDone: () => void }) {
  const mutation = useSetUp();
  const [problem, setProblem] = useState<ProblemError | null>(null);
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(setUp),
    defaultValues: { name: '', email: '', password: '', groupName: '' },
  });
  const submit = handleSubmit(async (values) => {
    setProblem(null);
    try {
      await mutation.mutateAsync(values);
      onDone();
    } catch (error) {
      setProblem(showProblemInForm(asProblem(error), setError, ['name', 'email', 'password', 'groupName']));
    }
  });
  const { errors, isSubmitting } = formState;
  return (
    <form noValidate className="grid max-w-md gap-4" onSubmit={(event) => void submit(event)}>
      <TextField label="Your name" autoComplete="name" error={errors.name?.message} {...register('name')} />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        hint="You sign in with it. No mail is sent."
        error={errors.email?.message}
        {...register('email')}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="new-password"
        hint="At least 12 characters; a few words are good."
        error={errors.password?.message}
        {...register('password')}
      />
      <TextField
        label="Name of the group"
        autoComplete="organization"
        hint="For example the field or the survey you work on. It can be changed later."
        error={errors.groupName?.message}
        {...register('groupName')}
      />
      {problem !== null && <ProblemNotice problem={problem} />}
      <div>
        <Button type="submit" kind="main" busy={isSubmitting} busyLabel="Setting up">
          Make account and group
        </Button>
      </div>
    </form>
  );
}
