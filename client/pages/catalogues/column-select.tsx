import type { FileColumn } from '../../../shared/schemas/mapping';
import { SelectField } from '../../components/select-field';

export type Columns = readonly FileColumn[];

export function columnName(columns: Columns, index: number): string {
  const name = columns[index]?.name ?? '';
  return name === '' ? `column ${index + 1}` : name;
}

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
