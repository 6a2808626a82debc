import { findAnswer, findQuery } from '../../shared/schemas/find';
import { groupRoute, type Route } from '../route';
import { find } from '../services/find';

export const findRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: '/api/groups/:group/find',
    summary: 'Objects by number, position or any of their names; near misses beside them',
    query: findQuery,
    answer: findAnswer,
    run: ({ context, actor, query }) => find(context, actor, query),
  }),
];
