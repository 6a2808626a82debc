import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { CONTROL_LOOK, FieldFrame, type FieldText } from './field-frame';

/** Several lines of text. */
export function TextAreaField({
  label,
  hint,
  error,
  id,
  className,
  ...rest
}: Omit<ComponentProps<'textarea'>, 'children'> & FieldText) {
  return (
    <FieldFrame id={id} label={label} hint={hint} error={error}>
      {(links) => (
        <textarea rows={4} {...rest} {...links} className={classNames(CONTROL_LOOK, 'resize-y', className)} />
      )}
    </FieldFrame>
  );
}
