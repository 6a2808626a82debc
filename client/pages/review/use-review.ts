import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { conflictList, verdictResult } from '../../../shared/schemas/verdict';
import { today } from '../../../shared/schemas/today';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';
import { refreshAfterVerdicts } from '../../api/runs';

/** Undecided and crowded candidates by run, for all runs at once. */
export function useWaiting(group: string) {
  return useQuery({
    queryKey: keys.today(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'today'), answer: today, signal }),
    select: ({ undecided }) => undecided,
  });
}

/** 'same' verdicts that are not carried out because a 'different' one forbids it. */
export function useConflicts(group: string) {
  return useQuery({
    queryKey: [...keys.verdicts(group), 'conflicts'],
    queryFn: ({ signal }) => request({ path: groupPath(group, 'conflicts'), answer: conflictList, signal }),
  });
}

/** Takes one verdict back by its id. */
export function useTakeBackVerdict(group: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (verdictId: number) =>
      request({ method: 'DELETE', path: groupPath(group, 'verdicts', verdictId), answer: verdictResult }),
    onSuccess: () => refreshAfterVerdicts(client, group),
  });
}
