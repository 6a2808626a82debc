import { ChoiceField } from '../../components/choice-field';
import { SelectField } from '../../components/select-field';
import type { Columns } from './column-name';
import { ColumnSelect } from './column-select';
import type { DraftPosition } from './draft-position';

type RaNotation = DraftPosition['raNotation'];
type DecNotation = DraftPosition['decNotation'];

const RA_NOTATIONS: { value: RaNotation; label: string }[] = [
  { value: 'degrees', label: 'degrees (188.736)' },
  { value: 'hours', label: 'hours (12.5824)' },
  { value: 'sexagesimal-hours', label: 'hours, minutes, seconds (12 34 56.7)' },
  { value: 'sexagesimal-degrees', label: 'degrees, minutes, seconds (188 44 10)' },
];
const DEC_NOTATIONS: { value: DecNotation; label: string }[] = [
  { value: 'degrees', label: 'degrees (-1.0342)' },
  { value: 'sexagesimal-degrees', label: 'degrees, minutes, seconds (-01 02 03)' },
];

/** Where right ascension and declination stand and how they are written. */
export function PositionFields({
  columns,
  value,
  onChange,
}: {
  columns: Columns;
  value: DraftPosition;
  onChange: (value: DraftPosition) => void;
}) {
  const { raNotation, decNotation } = value;
  return (
    <div className="grid gap-4">
      <ChoiceField
        legend="Position (ICRS)"
        inline
        value={value.kind}
        options={[
          { value: 'two-columns', label: 'in two columns' },
          { value: 'one-column', label: 'both in one column' },
        ]}
        onChange={(kind) =>
          onChange(
            kind === 'two-columns'
              ? { kind, raColumn: null, decColumn: null, raNotation, decNotation }
              : { kind, column: null, raNotation, decNotation },
          )
        }
      />
      <div className="grid gap-4 sm:grid-cols-2">
        {value.kind === 'two-columns' ? (
          <>
            <ColumnSelect
              label="Right ascension"
              columns={columns}
              value={value.raColumn}
              onChange={(raColumn) => onChange({ ...value, raColumn })}
            />
            <ColumnSelect
              label="Declination"
              columns={columns}
              value={value.decColumn}
              onChange={(decColumn) => onChange({ ...value, decColumn })}
            />
          </>
        ) : (
          <div className="sm:col-span-2">
            <ColumnSelect
              label="Column with both"
              columns={columns}
              value={value.column}
              onChange={(column) => onChange({ ...value, column })}
            />
          </div>
        )}
        <SelectField
          label="Right ascension is written in"
          value={raNotation}
          options={RA_NOTATIONS}
          onChange={(event) =>
            onChange({
              ...value,
              raNotation: RA_NOTATIONS.find((one) => one.value === event.target.value)?.value ?? 'degrees',
            })
          }
        />
        <SelectField
          label="Declination is written in"
          value={decNotation}
          options={DEC_NOTATIONS}
          onChange={(event) =>
            onChange({
              ...value,
              decNotation: DEC_NOTATIONS.find((one) => one.value === event.target.value)?.value ?? 'degrees',
            })
          }
        />
      </div>
    </div>
  );
}
