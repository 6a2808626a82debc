import { readFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

const manifest = z.object({ version: z.string() });

/** The version of the software, as the manifest says; kept with every run. */
export const SOFTWARE_VERSION = manifest.parse(
  JSON.parse(readFileSync(path.join(import.meta.dirname, '..', 'package.json'), 'utf8')),
).version;
