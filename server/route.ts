import type { Request, Response } from 'express';
import { z } from 'zod';
import { groupSlug } from '../shared/schemas/session';
import { type Role } from '../shared/words';
import type { Context, GroupActor, PersonActor } from './context';

export type Method = 'get' | 'post' | 'patch' | 'delete';

/** Who may call a route: anyone, any signed-in person, or a member of the group in the URL with at least a role. */
export type Access = 'anyone' | 'person' | Role;

interface Call<P, Q, B> {
  context: Context;
  params: P;
  query: Q;
  body: B;
  req: Request;
  res: Response;
}

interface Contract<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType, A extends z.ZodType> {
  method: Method;
  path: string;
  /** One line for the API description. */
  summary: string;
  params?: P;
  query?: Q;
  body?: B;
  /** Schema of the JSON answer; 'stream' when the handler writes the answer itself; 'nothing' answers 204. */
  answer: A | 'stream' | 'nothing';
  status?: number;
}

/** A route as the application mounts it and as the permission test walks over it. */
export interface Route {
  method: Method;
  path: string;
  summary: string;
  access: Access;
  params: z.ZodType;
  query: z.ZodType;
  body: z.ZodType | null;
  answer: z.ZodType | 'stream' | 'nothing';
  status: number;
  run(call: Call<unknown, unknown, unknown> & { person: PersonActor | null; actor: GroupActor | null }): Promise<unknown>;
}

const NONE = z.strictObject({});
const GROUP = z.strictObject({ group: groupSlug });

type Params<P> = P extends z.ZodType ? z.output<P> : Record<string, never>;

function assemble(contract: Contract<z.ZodType, z.ZodType, z.ZodType, z.ZodType>, access: Access, run: Route['run']): Route {
  const inGroup = access !== 'anyone' && access !== 'person';
  return {
    method: contract.method,
    path: contract.path,
    summary: contract.summary,
    access,
    params: contract.params ?? (inGroup ? GROUP : NONE),
    query: contract.query ?? NONE,
    body: contract.body ?? null,
    answer: contract.answer,
    status: contract.status ?? (contract.answer === 'nothing' ? 204 : 200),
    run,
  };
}

/** A route that needs no sign-in. */
export function publicRoute<
  A extends z.ZodType,
  P extends z.ZodType = typeof NONE,
  Q extends z.ZodType = typeof NONE,
  B extends z.ZodType = typeof NONE,
>(
  contract: Contract<P, Q, B, A> & {
    run(call: Call<Params<P>, z.output<Q>, z.output<B>> & { person: PersonActor | null }): Promise<z.input<A> | void>;
  },
): Route {
  return assemble(contract, 'anyone', (call) => contract.run(call as never));
}

/** A route for any signed-in person. */
export function personRoute<
  A extends z.ZodType,
  P extends z.ZodType = typeof NONE,
  Q extends z.ZodType = typeof NONE,
  B extends z.ZodType = typeof NONE,
>(
  contract: Contract<P, Q, B, A> & {
    run(call: Call<Params<P>, z.output<Q>, z.output<B>> & { person: PersonActor }): Promise<z.input<A> | void>;
  },
): Route {
  return assemble(contract, 'person', (call) => contract.run(call as never));
}

/** A route below /api/groups/:group for members with at least `role`; `params` must include `group`. */
export function groupRoute<
  A extends z.ZodType,
  P extends z.ZodType = typeof GROUP,
  Q extends z.ZodType = typeof NONE,
  B extends z.ZodType = typeof NONE,
>(
  contract: Contract<P, Q, B, A> & {
    role: Role;
    run(call: Call<Params<P>, z.output<Q>, z.output<B>> & { actor: GroupActor }): Promise<z.input<A> | void>;
  },
): Route {
  return assemble(contract, contract.role, (call) => contract.run(call as never));
}

/** Params of a group route with further parts. */
export function groupParams<S extends z.ZodRawShape>(shape: S) {
  return z.strictObject({ group: groupSlug, ...shape });
}
