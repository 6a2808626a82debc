import { z } from 'zod';
import {
  auditEvent,
  groupChange,
  groupDetail,
  member,
  memberChange,
  memberList,
  newGroup,
  newMember,
} from '../../shared/schemas/group';
import { pageOf, pageQuery } from '../../shared/schemas/page';
import { groupSlug, membershipSummary } from '../../shared/schemas/session';
import { groupParams, groupRoute, personRoute, type Route } from '../route';
import * as groups from '../services/groups';
import { sessionState } from '../services/sessions';

const MEMBERS = '/api/groups/:group/members';
const memberParams = groupParams({ personId: z.coerce.number().int().positive() });

export const groupRoutes: Route[] = [
  personRoute({
    method: 'get',
    path: '/api/groups',
    summary: 'The groups of the signed-in person',
    answer: z.strictObject({ items: z.array(membershipSummary) }),
    run: async ({ context, person }) => ({ items: (await sessionState(context, person)).memberships }),
  }),
  personRoute({
    method: 'post',
    path: '/api/groups',
    summary: 'Found a group',
    body: newGroup,
    answer: z.strictObject({ group: groupSlug }),
    status: 201,
    run: async ({ context, person, body }) => ({ group: await groups.createGroup(context, person, body.name) }),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: '/api/groups/:group',
    summary: 'Name, role and sizes of a group',
    answer: groupDetail,
    run: ({ context, actor }) => groups.groupDetail(context, actor),
  }),
  groupRoute({
    role: 'owner',
    method: 'patch',
    path: '/api/groups/:group',
    summary: 'Rename a group',
    body: groupChange,
    answer: 'nothing',
    run: ({ context, actor, body }) => groups.renameGroup(context, actor, body.name),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: MEMBERS,
    summary: 'The members of a group',
    answer: memberList,
    run: async ({ context, actor }) => ({ items: await groups.listMembers(context, actor) }),
  }),
  groupRoute({
    role: 'owner',
    method: 'post',
    path: MEMBERS,
    summary: 'Add a member',
    body: newMember,
    answer: member,
    status: 201,
    run: ({ context, actor, body }) => groups.addMember(context, actor, body),
  }),
  groupRoute({
    role: 'owner',
    method: 'patch',
    path: `${MEMBERS}/:personId`,
    summary: "Change a member's role",
    params: memberParams,
    body: memberChange,
    answer: 'nothing',
    run: ({ context, actor, params, body }) => groups.changeMember(context, actor, params.personId, body.role),
  }),
  groupRoute({
    role: 'owner',
    method: 'delete',
    path: `${MEMBERS}/:personId`,
    summary: 'Remove a member',
    params: memberParams,
    answer: 'nothing',
    run: ({ context, actor, params }) => groups.removeMember(context, actor, params.personId),
  }),
  groupRoute({
    role: 'curator',
    method: 'get',
    path: '/api/groups/:group/audit',
    summary: 'Who did what, the newest first',
    query: pageQuery,
    answer: pageOf(auditEvent),
    run: ({ context, actor, query }) =>
      groups.listEvents(context, actor, query.limit, query.after === undefined ? null : Number(query.after)),
  }),
];
