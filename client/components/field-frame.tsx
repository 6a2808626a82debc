import { useId, type ReactNode } from 'react';

export interface FieldText {
  label: ReactNode;
  hint?: ReactNode;
  /** Sentence that says what is wrong; shown beside the field and read with it. */
  error?: string;
}

export interface FieldLinks {
  id: string;
  'aria-invalid': true | undefined;
  'aria-describedby': string | undefined;
}

/** Label, hint and error around one control; `control` gets the attributes that tie them together. */
export function FieldFrame({
  id,
  label,
  hint,
  error,
  children,
}: FieldText & { id?: string; children: (links: FieldLinks) => ReactNode }) {
  const ownId = useId();
  const controlId = id ?? ownId;
  const hintId = hint === undefined ? null : `${controlId}-hint`;
  const errorId = error === undefined ? null : `${controlId}-error`;
  const described = [hintId, errorId].filter((one) => one !== null).join(' ');
  return (
    <div className="grid min-w-0 content-start gap-1">
      <label htmlFor={controlId} className="font-medium">
        {label}
      </label>
      {children({
        id: controlId,
        'aria-invalid': error === undefined ? undefined : true,
        'aria-describedby': described === '' ? undefined : described,
      })}
      {hintId !== null && (
        <p id={hintId} className="text-xs text-muted">
          {hint}
        </p>
      )}
      {errorId !== null && (
        <p id={errorId} className="text-xs text-bad">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      )}
    </div>
  );
}

/** Classes of every text-like control. */
export const CONTROL_LOOK =
  'min-h-9 w-full min-w-0 rounded-sm border border-edge bg-raised px-2 py-1 text-sm text-ink placeholder:text-muted ' +
  'hover:border-ink aria-invalid:border-bad disabled:border-dashed disabled:text-muted';
