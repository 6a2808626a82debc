import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { exportOptions, exportPreview, exportQuery } from '../../shared/schemas/export';
import { groupRoute, type Route } from '../route';
import * as mergedTable from '../services/merged-table';

const EXPORTS = '/api/groups/:group/exports';

export const exportRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${EXPORTS}/options`,
    summary: 'Catalogues and columns that a merged table can have',
    answer: exportOptions,
    run: ({ context, actor }) => mergedTable.exportOptions(context, actor),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${EXPORTS}/preview`,
    summary: 'Header, number of rows and first rows under a recipe',
    query: exportQuery,
    answer: exportPreview,
    run: ({ context, actor, query }) => mergedTable.exportPreview(context, actor, query.recipe),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${EXPORTS}/merged-table.csv`,
    summary: 'The merged table as CSV (RFC 4180), streamed',
    query: exportQuery,
    answer: 'stream',
    async run({ context, actor, query, res }) {
      res.type('text/csv').attachment(`${actor.group}-merged-table.csv`);
      await pipeline(Readable.from(mergedTable.mergedTableCsv(context, actor, query.recipe)), res);
    },
  }),
];
