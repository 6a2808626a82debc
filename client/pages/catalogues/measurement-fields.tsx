import type { ColumnMapping } from '../../../shared/schemas/mapping';
import { Button } from '../../components/button';
import { CheckboxField } from '../../components/checkbox-field';
import { SelectField } from '../../components/select-field';
import { TextField } from '../../components/text-field';
import { columnName, type Columns } from './column-name';
import { ColumnSelect } from './column-select';

type Measurements = Pick<ColumnMapping, 'properMotion' | 'photometry' | 'redshift'>;
type Band = ColumnMapping['photometry'][number];

interface Props {
  columns: Columns;
  value: Measurements;
  onChange: (change: Partial<Measurements>) => void;
}

/** Proper motion, magnitudes and fluxes, redshift. */
export function MeasurementFields(props: Props) {
  return (
    <>
      <ProperMotionFields {...props} />
      <PhotometryFields {...props} />
      <RedshiftFields {...props} />
    </>
  );
}

function ProperMotionFields({ columns, value: { properMotion }, onChange }: Props) {
  const change = (part: Partial<NonNullable<typeof properMotion>>) =>
    properMotion !== null && onChange({ properMotion: { ...properMotion, ...part } });
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 font-medium">Proper motion</legend>
      <CheckboxField
        label="The file holds proper motions"
        checked={properMotion !== null}
        onChange={(event) =>
          onChange({
            properMotion: event.target.checked
              ? { raColumn: 0, decColumn: 0, unit: 'mas/yr', raIncludesCosDec: true }
              : null,
          })
        }
      />
      {properMotion !== null && (
        <div className="grid gap-4 sm:grid-cols-2">
          <ColumnSelect
            label="Motion in right ascension"
            columns={columns}
            value={properMotion.raColumn}
            onChange={(raColumn) => raColumn !== null && change({ raColumn })}
          />
          <ColumnSelect
            label="Motion in declination"
            columns={columns}
            value={properMotion.decColumn}
            onChange={(decColumn) => decColumn !== null && change({ decColumn })}
          />
          <SelectField
            label="Unit of the motion"
            value={properMotion.unit}
            options={[
              { value: 'mas/yr', label: 'mas/yr' },
              { value: 'arcsec/yr', label: 'arcsec/yr' },
            ]}
            onChange={(event) => change({ unit: event.target.value === 'arcsec/yr' ? 'arcsec/yr' : 'mas/yr' })}
          />
          <SelectField
            label="Motion in right ascension is"
            value={properMotion.raIncludesCosDec ? 'with' : 'without'}
            options={[
              { value: 'with', label: 'on the sky (times cos Dec)' },
              { value: 'without', label: 'in the coordinate (without cos Dec)' },
            ]}
            onChange={(event) => change({ raIncludesCosDec: event.target.value === 'with' })}
          />
        </div>
      )}
    </fieldset>
  );
}

function PhotometryFields({ columns, value: { photometry }, onChange }: Props) {
  const unused = columns.findIndex(
    (column, index) => column.kind === 'number' && !photometry.some((band) => band.column === index),
  );
  const add = () => {
    const column = Math.max(unused, 0);
    const band: Band = { column, errorColumn: null, kind: 'magnitude', band: columnName(columns, column).slice(0, 30), unit: 'mag' };
    onChange({ photometry: [...photometry, band] });
  };
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 font-medium">Magnitudes and fluxes</legend>
      {photometry.map((band, i) => {
        const change = (part: Partial<Band>) =>
          onChange({ photometry: photometry.map((one, k) => (k === i ? { ...one, ...part } : one)) });
        return (
          <div key={i} className="grid items-end gap-3 border-b border-rule pb-3 sm:grid-cols-3 wide:grid-cols-[2fr_2fr_1fr_1fr_1fr_auto]">
            <ColumnSelect
              label={`Column ${i + 1}`}
              columns={columns}
              value={band.column}
              onChange={(column) => column !== null && change({ column })}
            />
            <ColumnSelect
              label="Its error"
              none="none"
              columns={columns}
              value={band.errorColumn}
              onChange={(errorColumn) => change({ errorColumn })}
            />
            <SelectField
              label="Kind"
              value={band.kind}
              options={[
                { value: 'magnitude', label: 'magnitude' },
                { value: 'flux', label: 'flux' },
              ]}
              onChange={(event) => {
                const kind = event.target.value === 'flux' ? 'flux' : 'magnitude';
                change({ kind, unit: kind === 'flux' ? 'mJy' : 'mag' });
              }}
            />
            <TextField
              label="Band"
              value={band.band}
              maxLength={30}
              onChange={(event) => change({ band: event.target.value })}
            />
            <TextField
              label="Unit"
              value={band.unit}
              maxLength={30}
              onChange={(event) => change({ unit: event.target.value })}
            />
            <Button
              aria-label={`Leave out ${band.band}`}
              onClick={() => onChange({ photometry: photometry.filter((_, k) => k !== i) })}
            >
              Leave out
            </Button>
          </div>
        );
      })}
      {unused !== -1 && (
        <div>
          <Button size="sm" onClick={add}>
            Add a magnitude or flux
          </Button>
        </div>
      )}
    </fieldset>
  );
}

function RedshiftFields({ columns, value: { redshift }, onChange }: Props) {
  const kind = redshift?.kind ?? 'none';
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 font-medium">Redshift or velocity</legend>
      <div className="grid gap-4 sm:grid-cols-3">
        <SelectField
          label="The file holds"
          value={kind}
          options={[
            { value: 'none', label: 'neither' },
            { value: 'redshift', label: 'a redshift' },
            { value: 'velocity-km-s', label: 'a velocity in km/s' },
          ]}
          onChange={(event) => {
            const next = event.target.value;
            const chosen = next === 'redshift' || next === 'velocity-km-s' ? next : null;
            onChange({
              redshift: chosen === null ? null : { column: 0, errorColumn: null, ...redshift, kind: chosen },
            });
          }}
        />
        {redshift !== null && (
          <>
            <ColumnSelect
              label="Column"
              columns={columns}
              value={redshift.column}
              onChange={(column) => column !== null && onChange({ redshift: { ...redshift, column } })}
            />
            <ColumnSelect
              label="Its error"
              none="none"
              columns={columns}
              value={redshift.errorColumn}
              onChange={(errorColumn) => onChange({ redshift: { ...redshift, errorColumn } })}
            />
          </>
        )}
      </div>
    </fieldset>
  );
}
