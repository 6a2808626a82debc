import express, { type Request, type Response, type Router } from 'express';
import type { z } from 'zod';
import { roleAtLeast, ROLES, type Role } from '../../shared/words';
import type { Context, GroupActor } from '../context';
import { Refusal } from '../errors';
import type { Access, Route } from '../route';
import { memberOf } from '../services/sessions';
import { personOf } from './session';

const JSON_LIMIT = '2mb';

function isRole(access: Access): access is Role {
  return ROLES.some((role) => role === access);
}

/** Who acts, as far as the route needs it; a foreign group and a missing one give the same answer. */
async function authorise(context: Context, route: Route, req: Request): Promise<GroupActor | null> {
  if (route.access === 'anyone') return null;
  const person = personOf(req);
  if (person === null) throw new Refusal('not-signed-in', 'This needs a sign-in.');
  if (!isRole(route.access)) return null;
  const actor = await memberOf(context, person, String(req.params.group));
  if (actor === null) throw new Refusal('not-found', 'There is no such group here.');
  if (!roleAtLeast(actor.role, route.access)) {
    throw new Refusal('role-too-low', `This needs the role ${route.access}; yours is ${actor.role}.`);
  }
  return actor;
}

function parsed(schema: z.ZodType, value: unknown): unknown {
  return schema.parse(value ?? {});
}

async function answer(context: Context, route: Route, req: Request, res: Response): Promise<void> {
  const actor = await authorise(context, route, req);
  const result = await route.run({
    context,
    person: personOf(req),
    actor,
    params: parsed(route.params, req.params),
    query: parsed(route.query, req.query),
    body: route.body === null ? undefined : parsed(route.body, req.body),
    req,
    res,
  });
  if (route.answer === 'stream') return;
  if (route.answer === 'nothing') {
    res.status(route.status).end();
    return;
  }
  // The answer is parsed on its way out as well: nothing leaves that the contract does not name.
  const checked = route.answer.safeParse(result);
  if (!checked.success) throw new Error(`answer of ${route.method} ${route.path}: ${checked.error.message}`);
  res.status(route.status).json(checked.data);
}

/** Mounts routes in the order given; bodies are parsed as JSON unless the route reads the request itself. */
export function mountRoutes(context: Context, routes: readonly Route[]): Router {
  const router = express.Router();
  const json = express.json({ limit: JSON_LIMIT });
  for (const route of routes) {
    const handlers = route.body === null ? [] : [json];
    router[route.method](route.path, ...handlers, (req: Request, res: Response) =>
      answer(context, route, req, res),
    );
  }
  return router;
}
