import type { ColumnMapping } from '../../../shared/schemas/mapping';
import { Button } from '../../components/button';
import { SelectField } from '../../components/select-field';
import { columnName, type Columns } from './column-name';
import { ColumnSelect } from './column-select';

const SEPARATORS = [
  { value: '', label: 'one name in the cell' },
  { value: ';', label: 'several names, split by ;' },
  { value: ',', label: 'several names, split by ,' },
  { value: '|', label: 'several names, split by |' },
  { value: '/', label: 'several names, split by /' },
];

/** Columns that hold names; the first name of a row is the one it goes by. */
export function NameFields({
  columns,
  value,
  onChange,
}: {
  columns: Columns;
  value: ColumnMapping['names'];
  onChange: (names: ColumnMapping['names']) => void;
}) {
  const unused = columns.findIndex((_, index) => !value.some((name) => name.column === index));
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 font-medium">Names</legend>
      {value.length === 0 && <p className="text-muted">No column holds names: the key will serve as the name.</p>}
      {value.map((name, i) => {
        const replace = (change: Partial<typeof name>) =>
          onChange(value.map((one, k) => (k === i ? { ...one, ...change } : one)));
        return (
          <div key={i} className="grid items-end gap-3 sm:grid-cols-[1fr_1fr_auto]">
            <ColumnSelect
              label={`Name column ${i + 1}`}
              columns={columns}
              value={name.column}
              onChange={(column) => column !== null && replace({ column })}
            />
            <SelectField
              label="holds"
              value={name.separator ?? ''}
              options={
                SEPARATORS.some((one) => one.value === (name.separator ?? ''))
                  ? SEPARATORS
                  : [...SEPARATORS, { value: name.separator ?? '', label: `several names, split by ${name.separator}` }]
              }
              onChange={(event) => replace({ separator: event.target.value === '' ? null : event.target.value })}
            />
            <Button
              aria-label={`Leave out the names in ${columnName(columns, name.column)}`}
              onClick={() => onChange(value.filter((_, k) => k !== i))}
            >
              Leave out
            </Button>
          </div>
        );
      })}
      {unused !== -1 && value.length < 20 && (
        <div>
          <Button size="sm" onClick={() => onChange([...value, { column: unused, separator: null }])}>
            Add a name column
          </Button>
        </div>
      )}
    </fieldset>
  );
}
