import type { FileInspection, TextDialect } from '../../../shared/schemas/mapping';
import { SelectField } from '../../components/select-field';

const DELIMITERS: { value: TextDialect['delimiter']; label: string }[] = [
  { value: ',', label: 'comma' },
  { value: '\t', label: 'tab' },
  { value: ';', label: 'semicolon' },
  { value: '|', label: 'bar' },
  { value: 'spaces', label: 'blanks' },
];

/** How the text is read, with the first rows as they stand in the file. */
export function DialectForm({
  inspection,
  onChange,
}: {
  inspection: FileInspection;
  onChange: (change: Partial<TextDialect>) => void;
}) {
  const { dialect } = inspection;
  return (
    <div className="grid gap-4">
      <div className="grid gap-3 sm:grid-cols-3 wide:grid-cols-5">
        <SelectField
          label="Cells are separated by"
          value={dialect.delimiter}
          options={DELIMITERS}
          onChange={(event) =>
            onChange({ delimiter: DELIMITERS.find((one) => one.value === event.target.value)?.value ?? ',' })
          }
        />
        <SelectField
          label="First line"
          value={dialect.header ? 'header' : 'row'}
          options={[
            { value: 'header', label: 'names of columns' },
            { value: 'row', label: 'a row like the others' },
          ]}
          onChange={(event) => onChange({ header: event.target.value === 'header' })}
        />
        <SelectField
          label="Comment lines begin with"
          value={dialect.commentPrefix ?? ''}
          options={['', '#', '//', '%', '!', '--'].map((value) => ({ value, label: value === '' ? 'there are none' : value }))}
          onChange={(event) => onChange({ commentPrefix: event.target.value === '' ? null : event.target.value })}
        />
        <SelectField
          label="Encoding"
          value={dialect.encoding}
          options={[
            { value: 'utf-8', label: 'UTF-8' },
            { value: 'latin1', label: 'Latin-1' },
          ]}
          onChange={(event) => onChange({ encoding: event.target.value === 'latin1' ? 'latin1' : 'utf-8' })}
        />
        <SelectField
          label="Decimal sign"
          value={dialect.decimalComma ? 'comma' : 'point'}
          options={[
            { value: 'point', label: 'point' },
            { value: 'comma', label: 'comma' },
          ]}
          onChange={(event) => onChange({ decimalComma: event.target.value === 'comma' })}
        />
      </div>
      <SampleTable inspection={inspection} />
    </div>
  );
}

const SAMPLE_ROWS = 5;

function SampleTable({ inspection }: { inspection: FileInspection }) {
  return (
    <details>
      <summary className="cursor-pointer text-link">The first rows as written</summary>
      <div className="mt-2 relative overflow-x-auto" tabIndex={0} role="region" aria-label="The first rows as written">
        <table className="border-collapse text-xs">
          <thead>
            <tr className="border-b border-edge text-left text-muted">
              {inspection.columns.map((column, i) => (
                <th key={i} className="py-1 pr-4 font-medium whitespace-nowrap">
                  {column.name === '' ? `column ${i + 1}` : column.name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {inspection.sample.slice(0, SAMPLE_ROWS).map((row, r) => (
              <tr key={r} className="border-b border-rule">
                {inspection.columns.map((_, i) => (
                  <td key={i} className="max-w-64 truncate py-1 pr-4 whitespace-nowrap">
                    {row[i] ?? ''}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
