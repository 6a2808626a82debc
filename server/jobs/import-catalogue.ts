import { importCatalogue, markImportEnded } from '../services/imports';
import type { JobKindWork } from '../services/jobs';

/** Reads an uploaded file into a revision and registers its entries. */
export const importCatalogueJob: JobKindWork = { work: importCatalogue, unwind: markImportEnded };
