import {
  keepPreviousData,
  useMutation,
  useQuery,
  useQueryClient,
  type QueryClient,
} from '@tanstack/react-query';
import { jobAccepted, jobList } from '../../shared/schemas/job';
import {
  policyCount,
  runAccepted,
  runDetail,
  runList,
  type NewRun,
  type PolicyRule,
} from '../../shared/schemas/run';
import { keys } from './query-keys';
import { groupPath, request } from './request';

/** The cross-matches of the group, the newest first. */
export function useRuns(group: string) {
  return useQuery({
    queryKey: keys.runs(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'runs'), answer: runList, signal }),
  });
}

/** One cross-match with statistics, verdict counts and policies. */
export function runQuery(group: string, run: number) {
  return {
    queryKey: [...keys.run(group, run), 'detail'],
    queryFn: ({ signal }: { signal: AbortSignal }) =>
      request({ path: groupPath(group, 'runs', run), answer: runDetail, signal }),
  };
}

export function useRun(group: string, run: number) {
  return useQuery(runQuery(group, run));
}

export function useCreateRun(group: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: NewRun) =>
      request({ method: 'POST', path: groupPath(group, 'runs'), body, answer: runAccepted }),
    onSuccess: () => client.invalidateQueries({ queryKey: keys.runs(group) }),
  });
}

/** What a policy would decide, kept in sight while the next rule is being counted; null asks nothing. */
export function usePolicyCount(group: string, run: number, rule: PolicyRule | null) {
  return useQuery({
    queryKey: [...keys.run(group, run), 'policy-count', rule],
    enabled: rule !== null,
    placeholderData: keepPreviousData,
    queryFn: ({ signal }) =>
      request({
        method: 'POST',
        path: groupPath(group, 'runs', run, 'policy', 'count'),
        body: rule,
        answer: policyCount,
        signal,
      }),
  });
}

/** Applies a policy; the verdicts appear together when the job is done. */
export function useApplyPolicy(group: string, run: number) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (rule: PolicyRule) =>
      request({
        method: 'POST',
        path: groupPath(group, 'runs', run, 'policies'),
        body: rule,
        answer: jobAccepted,
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: keys.jobs(group) }),
  });
}

/** Takes all verdicts of a policy back, as a job. */
export function useTakeBackPolicy(group: string, run: number) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (policyId: number) =>
      request({
        method: 'DELETE',
        path: groupPath(group, 'runs', run, 'policies', policyId),
        answer: jobAccepted,
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: keys.jobs(group) }),
  });
}

/** Id of the policy job that is at work on a run, started here or elsewhere; null when there is none. */
export function useOpenPolicyJob(group: string, run: number): string | null {
  const open = useQuery({
    queryKey: [...keys.jobs(group), 'open'],
    queryFn: ({ signal }) =>
      request({
        path: groupPath(group, 'jobs'),
        query: { which: 'open', limit: 100 },
        answer: jobList,
        signal,
      }),
  });
  const mine = open.data?.items.find((job) => job.kind === 'policy' && job.link === `cross-match/${run}`);
  return mine?.id ?? null;
}

/** After verdicts have changed: everything that is counted or drawn from them is asked for again. */
export function refreshAfterVerdicts(client: QueryClient, group: string): Promise<unknown> {
  return Promise.all(
    [keys.runs(group), keys.verdicts(group), keys.objects(group), keys.today(group), keys.jobs(group)].map(
      (queryKey) => client.invalidateQueries({ queryKey }),
    ),
  );
}
