import { note, noteText, noteVersions, objectNumberParam } from '../../shared/schemas/object';
import { rowIdParam } from '../../shared/schemas/page';
import { groupParams, groupRoute, type Route } from '../route';
import * as notes from '../services/notes';

const NOTE = '/api/groups/:group/notes/:noteId';
const noteParams = groupParams({ noteId: rowIdParam });

export const noteRoutes: Route[] = [
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: '/api/groups/:group/objects/:number/notes',
    summary: 'Write a note on an object (Markdown)',
    params: groupParams({ number: objectNumberParam }),
    body: noteText,
    answer: note,
    status: 201,
    run: ({ context, actor, params, body }) => notes.addNote(context, actor, params.number, body.body),
  }),
  groupRoute({
    role: 'contributor',
    method: 'patch',
    path: NOTE,
    summary: 'Change a note; its past versions are kept',
    params: noteParams,
    body: noteText,
    answer: 'nothing',
    run: ({ context, actor, params, body }) => notes.editNote(context, actor, params.noteId, body.body),
  }),
  groupRoute({
    role: 'contributor',
    method: 'delete',
    path: NOTE,
    summary: 'Delete a note',
    params: noteParams,
    answer: 'nothing',
    run: ({ context, actor, params }) => notes.deleteNote(context, actor, params.noteId),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${NOTE}/versions`,
    summary: 'What a note said before',
    params: noteParams,
    answer: noteVersions,
    run: async ({ context, actor, params }) => ({ items: await notes.noteVersions(context, actor, params.noteId) }),
  }),
];
