import { useMemo, useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { objectPage, type ObjectSummary } from '../../../shared/schemas/object';
import { usePaged } from '../../api/paged';
import { keys } from '../../api/query-keys';
import { groupPath } from '../../api/request';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { Coordinates } from '../../components/coordinates';
import { DataTable, type Column } from '../../components/data-table';
import { LinkButton } from '../../components/link-button';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { SelectField } from '../../components/select-field';
import { Stamp } from '../../components/stamp';
import { TextField } from '../../components/text-field';
import { useTableState } from '../../components/use-table-state';
import { MergeDialog } from './merge-dialog';
import { useStamps } from './use-objects';

const MOST_ENTRIES = 6;

/** The registry: every live object of the group. */
export function ObjectsPage() {
  const group = useGroup();
  const stamps = useStamps(group.slug);
  const [chosen, setChosen] = useState<ReadonlySet<number>>(new Set());
  const [merging, setMerging] = useState(false);
  const columns = useColumns(stamps, group.can('curator') ? { chosen, setChosen } : null);
  const table = useTableState({ columns, sort: { id: 'number', order: 'asc' } });
  const [search, setSearch] = useSearchParams();
  const filter = { name: search.get('name') ?? '', minEntries: search.get('minEntries') ?? '', catalogue: search.get('catalogue') ?? '' };
  const setFilter = (name: string, value: string) =>
    setSearch(
      (now) => {
        const next = new URLSearchParams(now);
        if (value === '') next.delete(name);
        else next.set(name, value);
        return next;
      },
      { replace: true },
    );
  const list = usePaged({
    queryKey: [...keys.objects(group.slug), 'list'],
    path: groupPath(group.slug, 'objects'),
    query: { ...filter, sort: table.sort.id, order: table.sort.order },
    answer: objectPage,
  });
  const filtered = Object.values(filter).some((value) => value !== '');
  return (
    <Page
      title="Objects"
      lead="The registry: one record per thing in the sky."
      actions={
        chosen.size > 1 && (
          <Button kind="main" onClick={() => setMerging(true)}>
            Merge {chosen.size} objects
          </Button>
        )
      }
      margin={
        <>
          <MarginNote title="Numbers">
            Every source is born as an object with a number that is never given to another. Merged objects go by the lowest
            of their numbers; the others forward to it.
          </MarginNote>
          <MarginNote title="Position">
            The error-weighted mean of the sources of the object, as the catalogues state them. Motions between epochs are
            not applied.
          </MarginNote>
        </>
      }
    >
      <div className="grid gap-4">
        <div className="grid gap-4 sm:grid-cols-3">
          <TextField
            label="Part of a name"
            type="search"
            value={filter.name}
            onChange={(event) => setFilter('name', event.target.value)}
          />
          <SelectField
            label="With at least"
            value={filter.minEntries}
            options={[
              { value: '', label: '1 source (all)' },
              ...Array.from({ length: MOST_ENTRIES - 1 }, (_, i) => ({ value: String(i + 2), label: `${i + 2} sources` })),
            ]}
            onChange={(event) => setFilter('minEntries', event.target.value)}
          />
          <SelectField
            label="Standing in"
            value={filter.catalogue}
            options={[{ value: '', label: 'any catalogue' }, ...[...stamps.keys()].map((label) => ({ value: label, label }))]}
            onChange={(event) => setFilter('catalogue', event.target.value)}
          />
        </div>
        <DataTable<ObjectSummary>
          label="Objects of the group"
          columns={columns}
          rowKey={(row) => row.number}
          table={table}
          empty={
            filtered ? (
              <>No object fits these filters.</>
            ) : (
              <>
                No object yet: they come with the first catalogue.{' '}
                {group.can('contributor') && <LinkButton to="../catalogues/new">Add a catalogue</LinkButton>}
              </>
            )
          }
          {...list}
        />
      </div>
      <MergeDialog
        group={group.slug}
        numbers={[...chosen].sort((a, b) => a - b)}
        open={merging}
        onClose={() => setMerging(false)}
        onMerged={() => setChosen(new Set())}
      />
    </Page>
  );
}

function useColumns(
  stamps: ReadonlyMap<string, number>,
  choice: { chosen: ReadonlySet<number>; setChosen: (chosen: ReadonlySet<number>) => void } | null,
): Column<ObjectSummary>[] {
  return useMemo(() => {
    const columns: Column<ObjectSummary>[] = [
      {
        id: 'number',
        header: 'Object',
        cell: (row) => (
          <Link to={String(row.number)} className="text-link">
            #{row.number}
          </Link>
        ),
        text: (row) => String(row.number),
        sortable: true,
        widthPx: 110,
      },
      { id: 'name', header: 'Name', cell: (row) => row.name, sortable: true, widthPx: 220 },
      {
        id: 'ra',
        header: 'Position',
        cell: (row) => <Coordinates raDeg={row.raDeg} decDeg={row.decDeg} errArcsec={row.errArcsec} />,
        text: (row) => `${row.raDeg} ${row.decDeg}`,
        sortable: true,
        widthPx: 260,
      },
      { id: 'err', header: 'Error', unit: '″', cell: (row) => row.errArcsec?.toFixed(3) ?? '—', numeric: true, widthPx: 90 },
      { id: 'entries', header: 'Sources', cell: (row) => row.entries, numeric: true, sortable: true, widthPx: 100 },
      {
        id: 'catalogues',
        header: 'Catalogues',
        cell: (row) => (
          <span className="flex gap-1">
            {row.catalogues.map((label) => (
              <Stamp key={label} catalogue={{ label, ordinal: stamps.get(label) ?? 0 }} />
            ))}
          </span>
        ),
        text: (row) => row.catalogues.join(' '),
        widthPx: 140,
      },
    ];
    if (choice === null) return columns;
    const { chosen, setChosen } = choice;
    const mark: Column<ObjectSummary> = {
      id: 'choose',
      header: 'Merge',
      cell: (row) => (
        <input
          type="checkbox"
          aria-label={`Choose object ${row.number} for merging`}
          className="size-4"
          checked={chosen.has(row.number)}
          onChange={() => {
            const next = new Set(chosen);
            if (!next.delete(row.number)) next.add(row.number);
            setChosen(next);
          }}
        />
      ),
      text: () => '',
      widthPx: 80,
    };
    return [...columns, mark];
  }, [stamps, choice]);
}
