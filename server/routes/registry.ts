import { mergeObjects, registryChange, splitObject } from '../../shared/schemas/object';
import { groupRoute, type Route } from '../route';
import * as registry from '../services/registry';

export const registryRoutes: Route[] = [
  groupRoute({
    role: 'curator',
    method: 'post',
    path: '/api/groups/:group/objects/merge',
    summary: 'Merge objects by hand',
    body: mergeObjects,
    answer: registryChange,
    run: ({ context, actor, body }) => registry.mergeObjects(context, actor, body),
  }),
  groupRoute({
    role: 'curator',
    method: 'post',
    path: '/api/groups/:group/objects/split',
    summary: 'Take sources out of an object by hand',
    body: splitObject,
    answer: registryChange,
    run: ({ context, actor, body }) => registry.splitObject(context, actor, body),
  }),
];
