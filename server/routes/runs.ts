import { z } from 'zod';
import { jobAccepted } from '../../shared/schemas/job';
import {
  candidatePage,
  candidateQuery,
  deskTask,
  newRun,
  policyCount,
  policyRule,
  runAccepted,
  runDetail,
  runList,
} from '../../shared/schemas/run';
import { groupParams, groupRoute, type Route } from '../route';
import * as candidates from '../services/candidates';
import * as desk from '../services/desk';
import * as policies from '../services/policies';
import * as runs from '../services/runs';

const RUNS = '/api/groups/:group/runs';
const runNumber = z.coerce.number().int().positive().max(2_147_483_647);
const runParams = groupParams({ run: runNumber });
const candidateParams = groupParams({ run: runNumber, seq: runNumber });
const policyParams = groupParams({ run: runNumber, policyId: runNumber });

export const runRoutes: Route[] = [
  groupRoute({
    role: 'curator',
    method: 'post',
    path: RUNS,
    summary: 'Start a cross-match',
    body: newRun,
    answer: runAccepted,
    status: 202,
    run: ({ context, actor, body }) => runs.createRun(context, actor, body),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: RUNS,
    summary: 'The cross-matches of the group, the newest first',
    answer: runList,
    run: async ({ context, actor }) => ({ items: await runs.listRuns(context, actor) }),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${RUNS}/:run`,
    summary: 'A cross-match: settings, statistics, verdicts so far, policies',
    params: runParams,
    answer: runDetail,
    run: ({ context, actor, params }) => runs.getRun(context, actor, params.run),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${RUNS}/:run/candidates`,
    summary: 'Candidates in the order of separation',
    params: runParams,
    query: candidateQuery,
    answer: candidatePage,
    run: ({ context, actor, params, query }) => candidates.listCandidates(context, actor, params.run, query),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${RUNS}/:run/candidates/:seq`,
    summary: 'Everything the review desk shows for one candidate',
    params: candidateParams,
    query: candidateQuery.omit({ limit: true, after: true }),
    answer: deskTask,
    run: ({ context, actor, params, query }) => desk.deskTask(context, actor, params.run, params.seq, query),
  }),
  groupRoute({
    role: 'curator',
    method: 'post',
    path: `${RUNS}/:run/policy/count`,
    summary: 'What a policy would decide; changes nothing',
    params: runParams,
    body: policyRule,
    answer: policyCount,
    run: ({ context, actor, params, body }) => policies.countPolicy(context, actor, params.run, body),
  }),
  groupRoute({
    role: 'curator',
    method: 'post',
    path: `${RUNS}/:run/policies`,
    summary: 'Apply a policy',
    params: runParams,
    body: policyRule,
    answer: jobAccepted,
    status: 202,
    run: ({ context, actor, params, body }) => policies.startPolicy(context, actor, params.run, body),
  }),
  groupRoute({
    role: 'curator',
    method: 'delete',
    path: `${RUNS}/:run/policies/:policyId`,
    summary: 'Take all verdicts of a policy back',
    params: policyParams,
    answer: jobAccepted,
    status: 202,
    run: ({ context, actor, params }) =>
      policies.startTakingBack(context, actor, params.run, params.policyId),
  }),
];
