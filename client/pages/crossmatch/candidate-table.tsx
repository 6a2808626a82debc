import { useMemo } from 'react';
import { useNavigate } from 'react-router-dom';
import { candidatePage, type RunDetail } from '../../../shared/schemas/run';
import { usePaged } from '../../api/paged';
import { keys } from '../../api/query-keys';
import { groupPath } from '../../api/request';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { DataTable } from '../../components/data-table';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { useTableState } from '../../components/use-table-state';
import { candidateColumns } from './candidate-columns';
import { CandidateFilters } from '../../components/candidate-filters';
import { deskAddress, isNarrowed, NO_FILTER, queryOfFilter } from '../../components/candidate-filter';
import { useCandidateFilter } from '../../components/use-candidate-filter';

/** Every candidate of a run, filtered and sorted by the address. */
export function CandidateTable({ run }: { run: RunDetail }) {
  const { slug } = useGroup();
  const navigate = useNavigate();
  const [filter, change] = useCandidateFilter(NO_FILTER);
  const columns = useMemo(
    () =>
      candidateColumns({
        radiusArcsec: run.radiusArcsec,
        addressOf: (seq) => `../${deskAddress(run.run, filter, seq)}`,
      }),
    [run.radiusArcsec, run.run, filter],
  );
  const table = useTableState({ columns, sort: { id: 'sep', order: 'asc' } });
  const candidates = usePaged({
    queryKey: [...keys.run(slug, run.run), 'candidates'],
    path: groupPath(slug, 'runs', run.run, 'candidates'),
    query: queryOfFilter(filter),
    answer: candidatePage,
  });
  const clear = () => change({ ...NO_FILTER, order: filter.order });
  return (
    <>
      <CandidateFilters run={run} filter={filter} onChange={change} />
      <DataTable
        label={`Candidates of cross-match ${run.run}`}
        columns={columns}
        {...candidates}
        table={table}
        rowKey={(candidate) => candidate.seq}
        onRowClick={(candidate) => void navigate(`../${deskAddress(run.run, filter, candidate.seq)}`)}
        tools={
          <>
            {isNarrowed(filter, NO_FILTER) && (
              <Button size="sm" onClick={clear}>
                All candidates
              </Button>
            )}
            <LinkButton size="sm" to={`../${deskAddress(run.run, filter)}`}>
              Review these
            </LinkButton>
          </>
        }
        empty={
          <EmptyState
            title="No candidate under this filter"
            actions={<Button onClick={clear}>All candidates</Button>}
          >
            The cross-match has candidates, but none that meets all of the conditions above.
          </EmptyState>
        }
      />
    </>
  );
}
