import path from 'node:path';

/** The folder with package.json. */
export const PROJECT_ROOT = path.join(import.meta.dirname, '..', '..');
