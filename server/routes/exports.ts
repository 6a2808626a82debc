import { exportOptions, exportPreview, exportQuery } from '../../shared/schemas/export';
import { groupRoute, type Route } from '../route';
import * as mergedTable from '../services/merged-table';

const EXPORTS = '/api/groups/:group/exports';
/** A reader who takes nothing for so long is gone; its connection to the database is wanted. */
const STALLED_MS = 120_000;

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
      const open = () => {
        res.type('text/csv').attachment(`${actor.group}-merged-table.csv`);
        res.setTimeout(STALLED_MS, () => res.destroy());
        return res;
      };
      await mergedTable.streamMergedTable(context, actor, query.recipe, open).catch((error: unknown) => {
        // Who cancels a download has seen no failure.
        if (!isCancelled(error)) throw error;
      });
    },
  }),
];

function isCancelled(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ERR_STREAM_PREMATURE_CLOSE';
}
