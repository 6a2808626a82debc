import { classNames } from './class-names';
import { TextField, type TextFieldProps } from './text-field';

/**
 * A number as text with a numeric keyboard: a control of type "number" drops what it can't read, and nothing
 * typed may be lost. Register it with `setValueAs: numberOrNull`.
 */
export function NumberField({ className, ...rest }: TextFieldProps) {
  return (
    <TextField
      inputMode="decimal"
      autoComplete="off"
      spellCheck={false}
      {...rest}
      className={classNames('text-right', className)}
    />
  );
}
