import { useId, type ReactNode } from 'react';

export interface ChoiceOption<V extends string> {
  value: V;
  label: ReactNode;
  hint?: ReactNode;
}

/** One of a few, all in sight (radio buttons). */
export function ChoiceField<V extends string>({
  legend,
  options,
  value,
  onChange,
  error,
  inline = false,
}: {
  legend: ReactNode;
  options: readonly ChoiceOption<V>[];
  value: V | null;
  onChange: (value: V) => void;
  error?: string;
  /** Beside each other instead of below each other. */
  inline?: boolean;
}) {
  const name = useId();
  return (
    <fieldset className="grid gap-1.5" aria-describedby={error === undefined ? undefined : `${name}-error`}>
      <legend className="mb-1 font-medium">{legend}</legend>
      <div className={inline ? 'flex flex-wrap gap-x-5 gap-y-1.5' : 'grid gap-1.5'}>
        {options.map((option) => (
          <div key={option.value} className="grid grid-cols-[auto_1fr] gap-x-2">
            <input
              type="radio"
              id={`${name}-${option.value}`}
              name={name}
              value={option.value}
              checked={option.value === value}
              onChange={() => onChange(option.value)}
              aria-describedby={option.hint === undefined ? undefined : `${name}-${option.value}-hint`}
              className="mt-0.5 size-4"
            />
            <label htmlFor={`${name}-${option.value}`}>{option.label}</label>
            {option.hint !== undefined && (
              <p id={`${name}-${option.value}-hint`} className="col-start-2 text-xs text-muted">
                {option.hint}
              </p>
            )}
          </div>
        ))}
      </div>
      {error !== undefined && (
        <p id={`${name}-error`} className="text-xs text-bad">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      )}
    </fieldset>
  );
}
