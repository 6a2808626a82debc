import type { ColumnMapping } from '../../../shared/schemas/mapping';
import type { ErrorMeaning } from '../../../shared/words';
import { NumberField } from '../../components/number-field';
import { numberOrNull } from '../../components/number-field-values';
import { SelectField } from '../../components/select-field';
import type { Columns } from './column-name';
import { ColumnSelect } from './column-select';

type ErrorMapping = NonNullable<ColumnMapping['error']>;
type Kind = ErrorMapping['kind'];
type AngleUnit = Extract<ErrorMapping, { kind: 'circle' }>['unit'];

const KINDS: { value: Kind | 'none'; label: string }[] = [
  { value: 'none', label: 'the file states none' },
  { value: 'circle', label: 'a radius, in one column' },
  { value: 'axes', label: 'in right ascension and declination, two columns' },
  { value: 'ellipse', label: 'an ellipse' },
  { value: 'constant', label: 'the same for all rows' },
];
const MEANINGS: { value: ErrorMeaning; label: string }[] = [
  { value: 'sigma', label: 'one sigma per axis' },
  { value: 'r50', label: 'radius holding 50 %' },
  { value: 'r68', label: 'radius holding 68 %' },
  { value: 'r90', label: 'radius holding 90 %' },
  { value: 'r95', label: 'radius holding 95 %' },
  { value: 'r99', label: 'radius holding 99 %' },
];
const UNITS: { value: AngleUnit; label: string }[] = [
  { value: 'arcsec', label: 'arcsec' },
  { value: 'mas', label: 'mas' },
  { value: 'arcmin', label: 'arcmin' },
  { value: 'deg', label: 'degrees' },
];

function emptyOf(kind: Kind | 'none'): ErrorMapping | null {
  const common = { unit: 'arcsec', meaning: 'sigma' } as const;
  if (kind === 'constant') return { kind, valueArcsec: 1, meaning: 'sigma' };
  if (kind === 'circle') return { kind, column: 0, ...common };
  if (kind === 'axes') return { kind, raColumn: 0, decColumn: 0, raUnit: 'arcsec', decUnit: 'arcsec', meaning: 'sigma' };
  if (kind === 'ellipse') return { kind, majorColumn: 0, minorColumn: 0, paColumn: null, ...common };
  return null;
}

/** The positional errors: where they stand, in which unit, and what the numbers mean. */
export function ErrorFields({
  columns,
  value,
  onChange,
}: {
  columns: Columns;
  value: ColumnMapping['error'];
  onChange: (error: ColumnMapping['error']) => void;
}) {
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 font-medium">Positional error</legend>
      <div className="grid gap-4 sm:grid-cols-2">
        <SelectField
          label="It is given as"
          value={value?.kind ?? 'none'}
          options={KINDS}
          onChange={(event) => onChange(emptyOf(KINDS.find((one) => one.value === event.target.value)?.value ?? 'none'))}
        />
        {value !== null && (
          <SelectField
            label="The numbers mean"
            value={value.meaning}
            options={MEANINGS}
            onChange={(event) =>
              onChange({
                ...value,
                meaning: MEANINGS.find((one) => one.value === event.target.value)?.value ?? 'sigma',
              })
            }
          />
        )}
      </div>
      {value !== null && (
        <div className="grid gap-4 sm:grid-cols-2">
          <ErrorColumns columns={columns} value={value} onChange={onChange} />
        </div>
      )}
    </fieldset>
  );
}

function ErrorColumns({
  columns,
  value,
  onChange,
}: {
  columns: Columns;
  value: ErrorMapping;
  onChange: (error: ErrorMapping) => void;
}) {
  if (value.kind === 'constant') {
    return (
      <NumberField
        label="Error of every row"
        unit="arcsec"
        defaultValue={value.valueArcsec}
        onChange={(event) => {
          const valueArcsec = numberOrNull(event.target.value);
          if (valueArcsec !== null && valueArcsec > 0) onChange({ ...value, valueArcsec });
        }}
      />
    );
  }
  if (value.kind === 'circle') {
    return (
      <>
        <ColumnSelect
          label="Column of the error"
          columns={columns}
          value={value.column}
          onChange={(column) => column !== null && onChange({ ...value, column })}
        />
        <UnitSelect value={value.unit} onChange={(unit) => onChange({ ...value, unit })} />
      </>
    );
  }
  if (value.kind === 'ellipse') {
    return (
      <>
        <ColumnSelect
          label="Major axis"
          columns={columns}
          value={value.majorColumn}
          onChange={(majorColumn) => majorColumn !== null && onChange({ ...value, majorColumn })}
        />
        <ColumnSelect
          label="Minor axis"
          columns={columns}
          value={value.minorColumn}
          onChange={(minorColumn) => minorColumn !== null && onChange({ ...value, minorColumn })}
        />
        <ColumnSelect
          label="Position angle (degrees east of north)"
          none="none: 0"
          columns={columns}
          value={value.paColumn}
          onChange={(paColumn) => onChange({ ...value, paColumn })}
        />
        <UnitSelect value={value.unit} onChange={(unit) => onChange({ ...value, unit })} />
      </>
    );
  }
  return (
    <>
      <ColumnSelect
        label="Error in right ascension"
        columns={columns}
        value={value.raColumn}
        onChange={(raColumn) => raColumn !== null && onChange({ ...value, raColumn })}
      />
      <SelectField
        label="Its unit"
        value={value.raUnit}
        options={[...UNITS, { value: 'time-second', label: 'seconds of time' }]}
        onChange={(event) =>
          onChange({
            ...value,
            raUnit:
              event.target.value === 'time-second'
                ? 'time-second'
                : (UNITS.find((one) => one.value === event.target.value)?.value ?? 'arcsec'),
          })
        }
      />
      <ColumnSelect
        label="Error in declination"
        columns={columns}
        value={value.decColumn}
        onChange={(decColumn) => decColumn !== null && onChange({ ...value, decColumn })}
      />
      <UnitSelect value={value.decUnit} onChange={(decUnit) => onChange({ ...value, decUnit })} />
    </>
  );
}

function UnitSelect({ value, onChange }: { value: AngleUnit; onChange: (unit: AngleUnit) => void }) {
  return (
    <SelectField
      label="Unit"
      value={value}
      options={UNITS}
      onChange={(event) => onChange(UNITS.find((one) => one.value === event.target.value)?.value ?? 'arcsec')}
    />
  );
}
