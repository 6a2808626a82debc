import type { ComponentProps, ReactNode } from 'react';
import { classNames } from './class-names';
import { CONTROL_LOOK, FieldFrame, type FieldText } from './field-frame';

export interface TextFieldProps extends Omit<ComponentProps<'input'>, 'children'>, FieldText {
  /** Unit or other short word at the end of the control. */
  unit?: ReactNode;
}

/** One line of text; takes what react-hook-form's `register` gives. */
export function TextField({ label, hint, error, unit, id, className, ...rest }: TextFieldProps) {
  return (
    <FieldFrame id={id} label={label} hint={hint} error={error}>
      {(links) => (
        <span className="flex min-w-0 items-center gap-2">
          <input type="text" {...rest} {...links} className={classNames(CONTROL_LOOK, className)} />
          {unit !== undefined && <span className="shrink-0 text-muted">{unit}</span>}
        </span>
      )}
    </FieldFrame>
  );
}
