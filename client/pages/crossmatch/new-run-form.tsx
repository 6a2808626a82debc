import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import type { z } from 'zod';
import type { CatalogueSummary } from '../../../shared/schemas/catalogue';
import { newRun, type NewRun } from '../../../shared/schemas/run';
import type { ProblemError } from '../../api/problem-error';
import { Button } from '../../components/button';
import { showProblemInForm } from '../../components/form-problem';
import { NumberField } from '../../components/number-field';
import { numberOrNull } from '../../components/number-field-values';
import { ProblemNotice } from '../../components/problem-notice';
import { Section } from '../../components/section';
import { TextField } from '../../components/text-field';
import { CatalogueOrder } from './catalogue-order';
import type { RunSettings } from './new-run-settings';
import { RadiusRuler } from './radius-ruler';
import { useCreateRun } from '../../api/runs';

const FIELDS = ['catalogues', 'radiusArcsec', 'title'] as const;

/** Catalogues in order, radius, title; leads to the page of the new cross-match. */
export function NewRunForm({
  group,
  ready,
  initial,
}: {
  group: string;
  ready: readonly CatalogueSummary[];
  initial: RunSettings;
}) {
  const navigate = useNavigate();
  const create = useCreateRun(group);
  const [problem, setProblem] = useState<ProblemError | null>(null);
  const form = useForm<z.input<typeof newRun>, unknown, NewRun>({
    resolver: zodResolver(newRun),
    defaultValues: {
      catalogues: initial.catalogues,
      radiusArcsec: numberOrNull(initial.radius) ?? undefined,
      title: initial.title,
    },
  });
  const { errors, isSubmitted } = form.formState;
  const chosen = useWatch({ control: form.control, name: 'catalogues' });
  const radiusArcsec = useWatch({ control: form.control, name: 'radiusArcsec' });
  const submit = form.handleSubmit((values) => {
    setProblem(null);
    create.mutate(values, {
      onSuccess: ({ run }) => void navigate(`../cross-match/${run}`),
      onError: (error) => setProblem(showProblemInForm(error, form.setError, FIELDS)),
    });
  });
  return (
    <form onSubmit={(event) => void submit(event)} className="grid gap-8" noValidate>
      <Section title="Catalogues">
        <CatalogueOrder
          ready={ready}
          chosen={chosen}
          onChange={(labels) => form.setValue('catalogues', labels, { shouldValidate: isSubmitted })}
          error={errors.catalogues?.message ?? errors.catalogues?.root?.message}
        />
      </Section>
      <Section title="Radius">
        <div className="grid max-w-3xl gap-4">
          <div className="max-w-72">
            <NumberField
              label="Largest separation"
              unit="arcsec"
              hint="0.01 to 3600 arcsec (1 degree). 1 arcmin is 60 arcsec."
              error={errors.radiusArcsec?.message}
              {...form.register('radiusArcsec', { setValueAs: numberOrNull })}
            />
          </div>
          <RadiusRuler
            group={group}
            chosen={chosen}
            ready={ready}
            radiusArcsec={radiusArcsec}
            onRadiusChange={(radius) =>
              form.setValue('radiusArcsec', radius, { shouldValidate: isSubmitted })
            }
          />
        </div>
      </Section>
      <Section title="Title">
        <div className="max-w-xl">
          <TextField
            label="Title"
            hint="Optional; without one, the labels of the catalogues are taken."
            error={errors.title?.message}
            {...form.register('title')}
          />
        </div>
      </Section>
      {problem !== null && <ProblemNotice problem={problem} />}
      <div className="flex flex-wrap items-center gap-3">
        <Button kind="main" type="submit" busy={create.isPending} busyLabel="Starting">
          Start the cross-match
        </Button>
        <span className="text-muted">Nothing is decided by it; it lists candidates.</span>
      </div>
    </form>
  );
}
