import { useState } from 'react';
import type { RunDetail } from '../../shared/schemas/run';
import { NumberField } from './number-field';
import { SelectField } from './select-field';
import {
  KIND_FILTERS,
  sepOf,
  VERDICT_FILTERS,
  type CandidateFilter,
  type KindFilter,
  type VerdictFilter,
} from './candidate-filter';
import { pairId, pairName } from './run-words';

const VERDICT_NAMES: Record<VerdictFilter, string> = {
  any: 'any or none',
  undecided: 'undecided',
  same: 'same',
  different: 'different',
  unsure: 'unsure',
};

const KIND_NAMES: Record<KindFilter, string> = {
  any: 'any',
  clear: 'clear',
  crowded: 'crowded',
};

/** The conditions on candidates, as controls in one line. */
export function CandidateFilters({
  run,
  filter,
  onChange,
}: {
  run: Pick<RunDetail, 'pairs' | 'radiusArcsec'>;
  filter: CandidateFilter;
  onChange: (change: Partial<CandidateFilter>) => void;
}) {
  return (
    <div
      role="group"
      aria-label="Filter"
      className="screen-only grid grid-cols-2 items-start gap-x-4 gap-y-3 sm:grid-cols-[repeat(auto-fit,minmax(10rem,1fr))]"
    >
      <SelectField
        label="Verdict"
        options={VERDICT_FILTERS.map((value) => ({ value, label: VERDICT_NAMES[value] }))}
        value={filter.verdict}
        onChange={({ target }) =>
          onChange({ verdict: VERDICT_FILTERS.find((value) => value === target.value) ?? 'any' })
        }
      />
      <SelectField
        label="Kind"
        options={KIND_FILTERS.map((value) => ({ value, label: KIND_NAMES[value] }))}
        value={filter.kind}
        onChange={({ target }) =>
          onChange({ kind: KIND_FILTERS.find((value) => value === target.value) ?? 'any' })
        }
      />
      <SepField
        label="Separation from"
        value={filter.minSepArcsec}
        onCommit={(minSepArcsec) => onChange({ minSepArcsec })}
      />
      <SepField
        label="Separation to"
        value={filter.maxSepArcsec}
        onCommit={(maxSepArcsec) => onChange({ maxSepArcsec })}
      />
      {run.pairs.length > 1 && (
        <SelectField
          label="Catalogues"
          options={[
            { value: '', label: 'all pairs' },
            ...run.pairs.map((pair) => ({ value: pairId(pair), label: pairName(pair) })),
          ]}
          value={filter.pair ?? ''}
          onChange={({ target }) => onChange({ pair: target.value === '' ? null : target.value })}
        />
      )}
    </div>
  );
}

/** A separation that counts once the field is left or Enter is pressed. */
function SepField({
  label,
  value,
  onCommit,
}: {
  label: string;
  value: number | null;
  onCommit: (value: number | null) => void;
}) {
  const text = value === null ? '' : String(value);
  const [typed, setTyped] = useState(text);
  const [known, setKnown] = useState(text);
  // The address has changed from elsewhere ('All candidates', the browser's Back): the field follows.
  if (known !== text) {
    setKnown(text);
    setTyped(text);
  }
  const next = sepOf(typed);
  const unreadable = typed.trim() !== '' && next === null;
  const commit = () => {
    if (!unreadable && next !== value) onCommit(next);
  };
  return (
    <NumberField
      label={label}
      unit="″"
      error={unreadable ? 'Write a number of arcseconds.' : undefined}
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit();
      }}
    />
  );
}
