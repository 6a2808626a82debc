import { SelectField } from '../../components/select-field';
import { columnName, type Columns } from './column-name';

/** One column of the file, or none when `none` names that choice. */
export function ColumnSelect({
  label,
  columns,
  value,
  none,
  hint,
  onChange,
}: {
  label: string;
  columns: Columns;
  value: number | null;
  none?: string;
  hint?: string;
  onChange: (index: number | null) => void;
}) {
  const choices = columns.map((column, index) => {
    const example = column.examples[0];
    return {
      value: String(index),
      label: example === undefined ? columnName(columns, index) : `${columnName(columns, index)} (${example})`,
    };
  });
  return (
    <SelectField
      label={label}
      hint={hint}
      value={value === null ? '' : String(value)}
      options={[...(none === undefined && value !== null ? [] : [{ value: '', label: none ?? 'choose' }]), ...choices]}
      onChange={(event) => onChange(event.target.value === '' ? null : Number(event.target.value))}
    />
  );
}
