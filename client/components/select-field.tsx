import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { CONTROL_LOOK, FieldFrame, type FieldText } from './field-frame';

export interface Choice {
  value: string;
  label: string;
  disabled?: boolean;
}

/** One of a list, by the browser's own control. */
export function SelectField({
  label,
  hint,
  error,
  options,
  id,
  className,
  ...rest
}: Omit<ComponentProps<'select'>, 'children'> & FieldText & { options: readonly Choice[] }) {
  return (
    <FieldFrame id={id} label={label} hint={hint} error={error}>
      {(links) => (
        <select {...rest} {...links} className={classNames(CONTROL_LOOK, className)}>
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.disabled}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </FieldFrame>
  );
}
