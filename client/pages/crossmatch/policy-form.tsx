import { GRADES } from '../../../shared/words';
import { CheckboxField } from '../../components/checkbox-field';
import { ChoiceField } from '../../components/choice-field';
import { NumberField } from '../../components/number-field';
import { formatSepArcsec } from '../../components/quantities';
import { Ruler } from '../../components/ruler';
import { draftSepArcsec, roundedSep, type RuleDraft } from './policy-rule';

/** The parts of a rule. */
export function PolicyForm({
  draft,
  onDraft,
  radiusArcsec,
}: {
  draft: RuleDraft;
  onDraft: (draft: RuleDraft) => void;
  radiusArcsec: number;
}) {
  const sepArcsec = draftSepArcsec(draft);
  return (
    <div className="grid content-start gap-4">
      <div className="grid gap-2">
        <NumberField
          label="Separation below"
          unit="arcsec"
          hint={`Drag the mark in the histogram or on the ruler. The radius is ${formatSepArcsec(radiusArcsec)}.`}
          error={sepArcsec === null ? 'Write a number of arcseconds above 0, at most 3600.' : undefined}
          value={draft.maxSepText}
          onChange={(event) => onDraft({ ...draft, maxSepText: event.target.value })}
        />
        <Ruler
          label="Limit of the rule"
          marks={[{ sepArcsec: radiusArcsec, label: 'radius' }]}
          limitArcsec={sepArcsec}
          onLimitChange={(limit) => onDraft({ ...draft, maxSepText: String(roundedSep(limit)) })}
        />
      </div>
      <CheckboxField
        label="Mutual best"
        hint="Each is the nearest candidate of the other."
        checked={draft.mutualBest}
        onChange={(event) => onDraft({ ...draft, mutualBest: event.target.checked })}
      />
      <CheckboxField
        label="No rival"
        hint="Neither has another candidate inside the radius."
        checked={draft.noRival}
        onChange={(event) => onDraft({ ...draft, noRival: event.target.checked })}
      />
      <ChoiceField
        legend="Grade of the verdicts"
        inline
        options={GRADES.map((grade) => ({ value: grade, label: grade }))}
        value={draft.grade}
        onChange={(grade) => onDraft({ ...draft, grade })}
      />
    </div>
  );
}
