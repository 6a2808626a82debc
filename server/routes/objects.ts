import { z } from 'zod';
import {
  newAlias,
  objectAnswer,
  objectChange,
  objectField,
  objectNumberParam,
  objectPage,
  objectQuery,
} from '../../shared/schemas/object';
import { rowIdParam } from '../../shared/schemas/page';
import { refuse } from '../errors';
import { groupParams, groupRoute, type Route } from '../route';
import { addAlias, retireAlias } from '../services/aliases';
import { getObject, objectField as fieldOf, renameObject } from '../services/object-page';
import { listObjects } from '../services/objects';

const OBJECTS = '/api/groups/:group/objects';
const objectParams = groupParams({ number: objectNumberParam });

/** The version in If-Match: "3". */
function versionOf(header: string | undefined): number {
  const version = /^(?:W\/)?"(\d+)"$/.exec(header ?? '')?.[1];
  if (version === undefined) refuse('version-missing', 'The request does not say which version it changes.');
  return Number(version);
}

export const objectRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: OBJECTS,
    summary: 'Live objects: filtered, sorted, or within a cone',
    query: objectQuery,
    answer: objectPage,
    run: ({ context, actor, query }) => listObjects(context, actor, query),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${OBJECTS}/:number`,
    summary: 'An object with names, sources, notes and history, or where its number forwards to',
    params: objectParams,
    answer: objectAnswer,
    run: ({ context, actor, params }) => getObject(context, actor, params.number),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${OBJECTS}/:number/field`,
    summary: 'Sources around an object',
    params: objectParams,
    query: z.strictObject({ radiusArcsec: z.coerce.number().positive().max(3600).default(30) }),
    answer: objectField,
    run: ({ context, actor, params, query }) => fieldOf(context, actor, params.number, query.radiusArcsec),
  }),
  groupRoute({
    role: 'curator',
    method: 'patch',
    path: `${OBJECTS}/:number`,
    summary: 'Choose the preferred name (If-Match: the version seen)',
    params: objectParams,
    body: objectChange,
    answer: 'nothing',
    run: ({ context, actor, params, body, req }) =>
      renameObject(context, actor, params.number, versionOf(req.headers['if-match']), body.name),
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: `${OBJECTS}/:number/aliases`,
    summary: 'Give an object a further name',
    params: objectParams,
    body: newAlias,
    answer: 'nothing',
    run: ({ context, actor, params, body }) => addAlias(context, actor, params.number, body.name),
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: '/api/groups/:group/aliases/:aliasId/retire',
    summary: 'Retire a name; it is kept, but leads nowhere',
    params: groupParams({ aliasId: rowIdParam }),
    answer: 'nothing',
    run: ({ context, actor, params }) => retireAlias(context, actor, params.aliasId),
  }),
];
