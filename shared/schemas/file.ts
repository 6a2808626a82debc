import { z } from 'zod';
import { columnMapping, fileInspection, textDialect } from './mapping';

export const uploadedFile = z.strictObject({
  fileId: z.uuid(),
  name: z.string(),
  sizeBytes: z.number().int(),
  sha256: z.string(),
  inspection: fileInspection,
});
export type UploadedFile = z.infer<typeof uploadedFile>;

/** Look at the file again with parts of the dialect set by hand. */
export const inspectAgain = z.strictObject({ dialect: textDialect.partial() });
export const previewRequest = z.strictObject({ dialect: textDialect, mapping: columnMapping });
