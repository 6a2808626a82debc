import { today } from '../../shared/schemas/today';
import { groupRoute, type Route } from '../route';
import * as service from '../services/today';

export const todayRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: '/api/groups/:group/today',
    summary: 'What waits, what runs, what changed',
    answer: today,
    run: ({ context, actor }) => service.today(context, actor),
  }),
];
