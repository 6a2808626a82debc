import { useState } from 'react';
import type { ColumnMapping } from '../../../shared/schemas/mapping';
import type { Columns } from './column-name';
import { ColumnSelect } from './column-select';
import { completePosition, type DraftPosition } from './draft-position';
import { ErrorFields } from './error-fields';
import { MeasurementFields } from './measurement-fields';
import { NameFields } from './name-fields';
import { PositionFields } from './position-fields';

type Rest = Omit<ColumnMapping, 'position'>;
const NOTHING: Rest = { keyColumn: null, names: [], error: null, properMotion: null, photometry: [], redshift: null };
const NO_POSITION: DraftPosition = {
  kind: 'two-columns',
  raColumn: null,
  decColumn: null,
  raNotation: 'degrees',
  decNotation: 'degrees',
};

/** What each column means. `mapping` is null until the position is complete. */
export function MappingForm({
  columns,
  mapping,
  onChange,
}: {
  columns: Columns;
  mapping: ColumnMapping | null;
  onChange: (mapping: ColumnMapping | null) => void;
}) {
  const [position, setPosition] = useState<DraftPosition>(mapping?.position ?? NO_POSITION);
  const [rest, setRest] = useState<Rest>(() => {
    if (mapping === null) return NOTHING;
    const { position: _position, ...others } = mapping;
    return others;
  });
  const tell = (nextPosition: DraftPosition, nextRest: Rest) => {
    const complete = completePosition(nextPosition);
    onChange(complete === null ? null : { position: complete, ...nextRest });
  };
  const change = (part: Partial<Rest>) => {
    const next = { ...rest, ...part };
    setRest(next);
    tell(position, next);
  };
  return (
    <div className="grid gap-6">
      <PositionFields
        columns={columns}
        value={position}
        onChange={(next) => {
          setPosition(next);
          tell(next, rest);
        }}
      />
      <div className="grid gap-6 sm:grid-cols-2">
        <ColumnSelect
          label="The catalogue's own key of a row"
          hint="Verdicts hold on to it when a new revision comes."
          none="none: the first name, else the row number"
          columns={columns}
          value={rest.keyColumn}
          onChange={(keyColumn) => change({ keyColumn })}
        />
      </div>
      <NameFields columns={columns} value={rest.names} onChange={(names) => change({ names })} />
      <ErrorFields columns={columns} value={rest.error} onChange={(error) => change({ error })} />
      <MeasurementFields columns={columns} value={rest} onChange={change} />
      <p className="text-muted">All other columns are kept as written.</p>
    </div>
  );
}
