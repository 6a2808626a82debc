import { useId, type ComponentProps } from 'react';
import type { FieldText } from './field-frame';

/** A yes-or-no setting; the whole line can be pressed. */
export function CheckboxField({
  label,
  hint,
  error,
  id,
  ...rest
}: Omit<ComponentProps<'input'>, 'children' | 'type'> & FieldText) {
  const ownId = useId();
  const controlId = id ?? ownId;
  const described = [hint !== undefined && `${controlId}-hint`, error !== undefined && `${controlId}-error`]
    .filter((one) => one !== false)
    .join(' ');
  return (
    <div className="grid grid-cols-[auto_1fr] gap-x-2">
      <input
        type="checkbox"
        {...rest}
        id={controlId}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={described === '' ? undefined : described}
        className="mt-0.5 size-4"
      />
      <label htmlFor={controlId}>{label}</label>
      {hint !== undefined && (
        <p id={`${controlId}-hint`} className="col-start-2 text-xs text-muted">
          {hint}
        </p>
      )}
      {error !== undefined && (
        <p id={`${controlId}-error`} className="col-start-2 text-xs text-bad">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      )}
    </div>
  );
}
