import { memo, useMemo, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Candidate, DeskTask } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { Coordinates } from '../../components/coordinates';
import { formatAngle, formatSepArcsec, plural } from '../../components/quantities';
import { Stamp } from '../../components/stamp';
import { compareRows, type NamedCell, type SharedColumn } from './differing-values';

type Side = Candidate['a'];

/** The two sources beside each other: position, errors, and every original column as written. */
export const SourceComparison = memo(function SourceComparison({ task }: { task: DeskTask }) {
  const { a, b } = task.candidate;
  const { shared, onlyA, onlyB } = useMemo(() => compareRows(task.rowA, task.rowB), [task.rowA, task.rowB]);
  const differing = shared.filter(({ relation }) => relation === 'differs').length;
  return (
    <div className="grid min-w-0 gap-4">
      <table className="w-full table-fixed border-collapse">
        <caption className="sr-only">The two sources, and columns that both catalogues have</caption>
        <colgroup>
          <col className="w-[26%] sm:w-[22%]" />
          <col />
          <col />
        </colgroup>
        <thead>
          <tr className="border-b border-edge text-left">
            <th scope="col">
              <span className="sr-only">Column</span>
            </th>
            <SideHead letter="A" side={a} />
            <SideHead letter="B" side={b} />
          </tr>
        </thead>
        <tbody>
          <FactRow name="position" a={<Position side={a} />} b={<Position side={b} />} />
          <FactRow name="error, 1σ" a={errorText(a)} b={errorText(b)} />
          <FactRow name="object" a={<ObjectOf side={a} />} b={<ObjectOf side={b} />} />
          <FactRow name="row" a={a.rowNo} b={b.rowNo} />
          {shared.map((column, index) => (
            <SharedRow key={`${column.name} ${index}`} column={column} />
          ))}
        </tbody>
      </table>
      <p className="text-xs text-muted">
        {shared.length === 0
          ? 'The two catalogues have no column of the same name.'
          : `${plural(shared.length, 'column', 'columns')} of the same name; ${differing} with different values, marked ≠.`}
      </p>
      <div className="grid grid-cols-2 gap-4">
        <OwnColumns side={a} columns={onlyA} />
        <OwnColumns side={b} columns={onlyB} />
      </div>
    </div>
  );
});

function SideHead({ letter, side }: { letter: 'A' | 'B'; side: Side }) {
  return (
    <th scope="col" className="px-2 py-1.5 align-top font-bold">
      <span className="flex min-w-0 flex-wrap items-center gap-x-2 gap-y-1">
        <span className="text-accent">{letter}</span>
        <Stamp catalogue={{ label: side.catalogue, ordinal: side.ordinal }} size={20} />
        <span className="min-w-0 break-words">{side.designation}</span>
      </span>
    </th>
  );
}

function FactRow({ name, a, b }: { name: string; a: ReactNode; b: ReactNode }) {
  return (
    <tr className="border-b border-rule align-top">
      <th scope="row" className="py-1 pr-2 text-left font-normal text-muted">
        {name}
      </th>
      <td className="px-2 py-1 break-words">{a}</td>
      <td className="px-2 py-1 break-words">{b}</td>
    </tr>
  );
}

function SharedRow({ column: { name, a, b, relation } }: { column: SharedColumn }) {
  const differs = relation === 'differs';
  return (
    <tr className={differs ? 'border-b border-rule bg-sunken align-top' : 'border-b border-rule align-top'}>
      <th scope="row" className="py-1 pr-2 text-left font-normal break-words text-muted">
        {differs && (
          <span className="text-warn">
            <span aria-hidden="true">≠ </span>
            <span className="sr-only">differs: </span>
          </span>
        )}
        {name}
      </th>
      <Cell text={a} strong={differs} />
      <Cell text={b} strong={differs} />
    </tr>
  );
}

function Cell({ text, strong }: { text: string; strong: boolean }) {
  return (
    <td className={strong ? 'px-2 py-1 font-bold break-words' : 'px-2 py-1 break-words'}>
      {text.trim() === '' ? <span className="text-muted">empty</span> : text}
    </td>
  );
}

function Position({ side }: { side: Side }) {
  return <Coordinates raDeg={side.raDeg} decDeg={side.decDeg} errArcsec={side.errMajArcsec} copy />;
}

function errorText({ errMajArcsec, errMinArcsec, errPaDeg }: Side): string {
  if (errMajArcsec === null) return 'not stated';
  if (errMinArcsec === null || errMinArcsec === errMajArcsec) return formatSepArcsec(errMajArcsec);
  const angle = errPaDeg === null ? '' : ` at ${formatAngle(errPaDeg)}`;
  return `${formatSepArcsec(errMajArcsec)} × ${formatSepArcsec(errMinArcsec)}${angle}`;
}

function ObjectOf({ side }: { side: Side }) {
  const { slug } = useGroup();
  if (side.objectNumber === null) return <span className="text-muted">being registered</span>;
  return <Link to={`/g/${slug}/objects/${side.objectNumber}`}>{side.objectNumber}</Link>;
}

/** Columns that only one of the catalogues has. */
function OwnColumns({ side, columns }: { side: Side; columns: readonly NamedCell[] }) {
  if (columns.length === 0) return <p className="text-muted">No further column in {side.catalogue}.</p>;
  return (
    <div className="min-w-0">
      <h3 className="mb-1 font-medium">Only in {side.catalogue}</h3>
      <dl>
        {columns.map(({ name, cell }, index) => (
          <div
            key={`${name} ${index}`}
            className="grid gap-x-3 border-b border-rule py-0.5 sm:grid-cols-[minmax(0,2fr)_minmax(0,3fr)]"
          >
            <dt className="break-words text-muted">{name}</dt>
            <dd className="break-words">
              {cell.trim() === '' ? <span className="text-muted">empty</span> : cell}
            </dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
