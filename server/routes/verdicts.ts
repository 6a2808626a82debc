import { rowIdParam } from '../../shared/schemas/page';
import { conflictList, newVerdict, verdictResult } from '../../shared/schemas/verdict';
import { groupParams, groupRoute, type Route } from '../route';
import * as conflicts from '../services/conflicts';
import * as verdicts from '../services/verdicts';

const VERDICTS = '/api/groups/:group/verdicts';

export const verdictRoutes: Route[] = [
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: VERDICTS,
    summary: 'Say whether two sources are the same',
    body: newVerdict,
    answer: verdictResult,
    status: 201,
    run: ({ context, actor, body }) => verdicts.giveVerdict(context, actor, body),
  }),
  groupRoute({
    role: 'contributor',
    method: 'delete',
    path: `${VERDICTS}/:id`,
    summary: 'Take a verdict back: your own, or any as a curator',
    params: groupParams({ id: rowIdParam }),
    answer: verdictResult,
    run: ({ context, actor, params }) => verdicts.takeBackVerdict(context, actor, params.id),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: '/api/groups/:group/conflicts',
    summary: "Verdicts 'same' that are not carried out because a verdict 'different' forbids it",
    answer: conflictList,
    run: ({ context, actor }) => conflicts.listConflicts(context, actor),
  }),
];
