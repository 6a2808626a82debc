import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { catalogueLabel, catalogueText } from '../../../shared/schemas/catalogue';
import type { UploadedFile } from '../../../shared/schemas/file';
import type { ColumnMapping } from '../../../shared/schemas/mapping';
import { Button } from '../../components/button';
import { showProblemInForm } from '../../components/form-problem';
import { NumberField } from '../../components/number-field';
import { numberOrNull } from '../../components/number-field-values';
import { ProblemNotice } from '../../components/problem-notice';
import { TextAreaField } from '../../components/text-area-field';
import { TextField } from '../../components/text-field';
import { labelFromFileName } from './label-from-file-name';
import { useCreateCatalogue } from './use-catalogues';

const description = catalogueText.extend({
  label: catalogueLabel,
  epochYear: z.number({ error: 'Write a year, like 2016.0.' }).min(1800).max(2100).nullable(),
});
type Description = z.infer<typeof description>;
const FIELDS = ['label', 'title', 'description', 'band', 'citation', 'epochYear'] as const;

/** Label, title and the rest; the last step before the import. */
export function DescribeForm({
  group,
  file,
  mapping,
  onAccepted,
}: {
  group: string;
  file: UploadedFile;
  mapping: ColumnMapping | null;
  onAccepted: (label: string) => void;
}) {
  const create = useCreateCatalogue(group);
  const form = useForm<Description>({
    resolver: zodResolver(description),
    defaultValues: {
      label: labelFromFileName(file.name),
      title: '',
      description: '',
      band: '',
      citation: '',
      epochYear: null,
    },
  });
  const { errors } = form.formState;
  const submit = form.handleSubmit((values) => {
    if (mapping === null) return;
    create.mutate(
      { ...values, fileId: file.fileId, dialect: file.inspection.dialect, mapping, frame: 'ICRS' },
      {
        onSuccess: (accepted) => onAccepted(accepted.label),
        onError: (error) => showProblemInForm(error, form.setError, FIELDS),
      },
    );
  });
  return (
    <form onSubmit={(event) => void submit(event)} className="grid gap-4" noValidate>
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField
          label="Label"
          hint="Its acronym in the group: the stamp, columns and addresses use it."
          error={errors.label?.message}
          {...form.register('label')}
        />
        <TextField label="Title" error={errors.title?.message} {...form.register('title')} />
        <TextField label="Band" hint="Like optical, near-infrared, 1.4 GHz." error={errors.band?.message} {...form.register('band')} />
        <NumberField
          label="Epoch of the positions"
          unit="Julian year"
          hint="Leave it empty when it is not known."
          error={errors.epochYear?.message}
          {...form.register('epochYear', { setValueAs: numberOrNull })}
        />
      </div>
      <TextAreaField label="Description" error={errors.description?.message} {...form.register('description')} />
      <TextField label="Citation" error={errors.citation?.message} {...form.register('citation')} />
      {create.error !== null && <ProblemNotice problem={create.error} />}
      <div className="flex flex-wrap items-center gap-3">
        <Button kind="main" type="submit" busy={create.isPending} disabled={mapping === null}>
          Import
        </Button>
        {mapping === null && <span className="text-muted">The columns of the position are still to be chosen.</span>}
      </div>
    </form>
  );
}
