import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { newMember, type NewMember } from '../../../shared/schemas/group';
import { ROLES } from '../../../shared/words';
import { Button } from '../../components/button';
import { showProblemInForm } from '../../components/form-problem';
import { ProblemNotice } from '../../components/problem-notice';
import { SelectField } from '../../components/select-field';
import { TextField } from '../../components/text-field';
import { useMemberChanges } from './use-members';

const EMPTY = { email: '', name: '', role: 'contributor', password: undefined } as const;

/** Adds somebody; who has no account yet gets one with a first password. */
export function NewMemberForm({ group }: { group: string }) {
  const { add } = useMemberChanges(group);
  const form = useForm<z.input<typeof newMember>, unknown, NewMember>({
    resolver: zodResolver(newMember),
    defaultValues: EMPTY,
  });
  const { errors } = form.formState;
  const submit = form.handleSubmit((values) =>
    add.mutate(values, {
      onSuccess: () => form.reset(EMPTY),
      onError: (error) => showProblemInForm(error, form.setError, ['email', 'name', 'role', 'password']),
    }),
  );
  return (
    <form onSubmit={(event) => void submit(event)} className="grid gap-4" noValidate>
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField label="E-mail" type="email" error={errors.email?.message} {...form.register('email')} />
        <TextField label="Name" error={errors.name?.message} {...form.register('name')} />
        <SelectField
          label="Role"
          options={ROLES.map((value) => ({ value, label: value }))}
          error={errors.role?.message}
          {...form.register('role')}
        />
        <TextField
          label="First password"
          type="password"
          autoComplete="new-password"
          hint="Only for somebody without an account; at least 12 characters."
          error={errors.password?.message}
          {...form.register('password', { setValueAs: (value: string) => (value === '' ? undefined : value) })}
        />
      </div>
      {add.error !== null && <ProblemNotice problem={add.error} />}
      {add.isSuccess && <p className="text-good">✓ {add.data.name} is a member now.</p>}
      <div>
        <Button kind="main" type="submit" busy={add.isPending}>
          Add
        </Button>
      </div>
    </form>
  );
}
