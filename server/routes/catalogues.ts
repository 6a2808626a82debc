import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import {
  catalogueAccepted,
  catalogueChange,
  catalogueDetail,
  catalogueLabel,
  catalogueList,
  citationList,
  coverage,
  newCatalogue,
  setAsidePage,
  sourcePage,
  sourceQuery,
} from '../../shared/schemas/catalogue';
import { pageQuery } from '../../shared/schemas/page';
import { groupParams, groupRoute, type Route } from '../route';
import * as catalogues from '../services/catalogues';
import { setAsideCsv, setAsidePageOf } from '../services/set-aside';
import { listSources } from '../services/sources';

const CATALOGUES = '/api/groups/:group/catalogues';
const catalogueParams = groupParams({ label: catalogueLabel });

export const catalogueRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: '/api/groups/:group/citations',
    summary: 'What work with the catalogues has to cite',
    answer: citationList,
    run: async ({ context, actor }) => ({ items: await catalogues.listCitations(context, actor) }),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: CATALOGUES,
    summary: 'The catalogues of the group in order of arrival',
    answer: catalogueList,
    run: async ({ context, actor }) => ({ items: await catalogues.listCatalogues(context, actor) }),
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: CATALOGUES,
    summary: 'Make a catalogue from an uploaded file; the import runs as a job',
    body: newCatalogue,
    answer: catalogueAccepted,
    status: 202,
    run: ({ context, actor, body }) => catalogues.createCatalogue(context, actor, body),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${CATALOGUES}/:label`,
    summary: 'Description, columns and counts of a catalogue',
    params: catalogueParams,
    answer: catalogueDetail,
    run: ({ context, actor, params }) => catalogues.getCatalogue(context, actor, params.label),
  }),
  groupRoute({
    role: 'curator',
    method: 'patch',
    path: `${CATALOGUES}/:label`,
    summary: 'Change title, description, band or citation',
    params: catalogueParams,
    body: catalogueChange,
    answer: 'nothing',
    run: ({ context, actor, params, body }) => catalogues.changeCatalogue(context, actor, params.label, body),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${CATALOGUES}/:label/sources`,
    summary: 'Sources, sorted and filtered, a page at a time',
    params: catalogueParams,
    query: sourceQuery,
    answer: sourcePage,
    run: ({ context, actor, params, query }) => listSources(context, actor, params.label, query),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${CATALOGUES}/:label/coverage`,
    summary: 'Density squares for the coverage picture',
    params: catalogueParams,
    answer: coverage,
    run: ({ context, actor, params }) => catalogues.catalogueCoverage(context, actor, params.label),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${CATALOGUES}/:label/set-aside`,
    summary: 'Rows that could not be read as sources, with line and reason',
    params: catalogueParams,
    query: pageQuery,
    answer: setAsidePage,
    run: ({ context, actor, params, query }) => setAsidePageOf(context, actor, params.label, query),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${CATALOGUES}/:label/set-aside.csv`,
    summary: 'All set-aside rows as a CSV file',
    params: catalogueParams,
    answer: 'stream',
    async run({ context, actor, params, res }) {
      const lines = await setAsideCsv(context, actor, params.label);
      res.type('text/csv').attachment(`${params.label}-set-aside.csv`);
      await pipeline(Readable.from(lines), res);
    },
  }),
];
