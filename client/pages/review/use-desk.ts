import { useReducer, useRef } from 'react';
import { queryOptions, useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { candidatePage, deskTask } from '../../../shared/schemas/run';
import { verdictResult, type NewVerdict } from '../../../shared/schemas/verdict';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';
import { queryOfFilter, type CandidateFilter } from '../../components/candidate-filter';
import { givenAfter, undoable } from './given-verdicts';

const deskKey = (group: string, run: number) => [...keys.run(group, run), 'desk'] as const;

/** Everything the desk shows of one candidate, and its neighbours in the queue of the filter. */
export function taskQuery(group: string, run: number, seq: number, filter: CandidateFilter) {
  const query = queryOfFilter(filter);
  return queryOptions({
    queryKey: [...deskKey(group, run), seq, query],
    queryFn: ({ signal }) =>
      request({ path: groupPath(group, 'runs', run, 'candidates', seq), query, answer: deskTask, signal }),
  });
}

/**
 * Number of the first candidate under a filter; null when there is none. Never taken from the cache: verdicts have
 * been given since it was asked.
 */
export function useFirstSeq(group: string, run: number, filter: CandidateFilter) {
  const query = queryOfFilter(filter);
  return useQuery({
    queryKey: [...keys.run(group, run), 'first', query],
    staleTime: 0,
    gcTime: 0,
    queryFn: ({ signal }) =>
      request({
        path: groupPath(group, 'runs', run, 'candidates'),
        query: { ...query, limit: 1 },
        answer: candidatePage,
        signal,
      }),
    select: ({ items }) => items[0]?.seq ?? null,
  });
}

/** The verdicts given at this desk: sends them, keeps what became of each, takes the last one back. */
export function useGivenVerdicts(
  group: string,
  run: number,
  onTakenBack: (given: { seq: number; body: NewVerdict }) => void,
) {
  const client = useQueryClient();
  const [given, dispatch] = useReducer(givenAfter, []);
  const lastId = useRef(0);
  const give = useMutation({
    mutationFn: ({ body }: { id: number; body: NewVerdict; onSaved?: () => void }) =>
      request({ method: 'POST', path: groupPath(group, 'verdicts'), body, answer: verdictResult }),
    onSuccess: (result, { id, onSaved }) => {
      dispatch({ type: 'accepted', id, result });
      onSaved?.();
      return refreshDesk(client, group, run);
    },
    onError: (problem, { id }) => dispatch({ type: 'refused', id, problem }),
  });
  const takeBack = useMutation({
    mutationFn: ({ verdictId }: { id: number; seq: number; body: NewVerdict; verdictId: number }) =>
      request({ method: 'DELETE', path: groupPath(group, 'verdicts', verdictId), answer: verdictResult }),
    onSuccess: (_, { id, seq, body }) => {
      dispatch({ type: 'taken back', id });
      onTakenBack({ seq, body });
      return refreshDesk(client, group, run);
    },
    onError: (problem, { id }) => dispatch({ type: 'not taken back', id, problem }),
  });
  return {
    given,
    give: (seq: number, body: NewVerdict, onSaved?: () => void) => {
      lastId.current += 1;
      const id = lastId.current;
      dispatch({ type: 'sent', id, seq, body });
      give.mutate({ id, body, onSaved });
    },
    giveAgain: (id: number) => {
      const failed = given.find((one) => one.id === id);
      if (failed === undefined) return;
      dispatch({ type: 'sent again', id });
      give.mutate({ id, body: failed.body });
    },
    undo: () => {
      const last = undoable(given);
      const verdictId = last?.result?.verdict?.id;
      if (last === null || verdictId === undefined) return;
      dispatch({ type: 'taking back', id: last.id });
      takeBack.mutate({ id: last.id, seq: last.seq, body: last.body, verdictId });
    },
    dismiss: (id: number) => dispatch({ type: 'dismissed', id }),
  };
}

/**
 * After a verdict: the task in sight is asked for again at once. Lists and statistics of the run, objects and the
 * rest only when they are next looked at, because verdicts come every few seconds.
 */
async function refreshDesk(client: QueryClient, group: string, run: number): Promise<void> {
  for (const queryKey of [keys.runs(group), keys.verdicts(group), keys.objects(group), keys.today(group)]) {
    await client.invalidateQueries({ queryKey, refetchType: 'none' });
  }
  await client.refetchQueries({ queryKey: deskKey(group, run), type: 'active', stale: true });
}
