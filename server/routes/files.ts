import busboy from 'busboy';
import type { Request } from 'express';
import { z } from 'zod';
import { inspectAgain, previewRequest, uploadedFile, type UploadedFile } from '../../shared/schemas/file';
import { mappingPreview } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { Refusal } from '../errors';
import { groupParams, groupRoute, type Route } from '../route';
import * as files from '../services/files';

const FILES = '/api/groups/:group/files';
const fileParams = groupParams({ fileId: z.uuid() });

export const fileRoutes: Route[] = [
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: FILES,
    summary: 'Upload a table (multipart, one part named "file"); answers what its beginning tells',
    answer: uploadedFile,
    status: 201,
    run: ({ context, actor, req }) => receiveFile(context, actor, req),
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: `${FILES}/:fileId/inspect`,
    summary: 'Look at an uploaded file again with parts of the dialect set by hand',
    params: fileParams,
    body: inspectAgain,
    answer: uploadedFile,
    run: ({ context, actor, params, body }) =>
      files.inspectFileAgain(context, actor, params.fileId, body.dialect),
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: `${FILES}/:fileId/preview`,
    summary: 'The first rows as they will be understood under a mapping',
    params: fileParams,
    body: previewRequest,
    answer: mappingPreview,
    run: ({ context, actor, params, body }) =>
      files.previewFile(context, actor, params.fileId, body.dialect, body.mapping),
  }),
];

/** Streams the one file of a multipart request into the storage. */
function receiveFile(context: Context, actor: GroupActor, req: Request): Promise<UploadedFile> {
  return new Promise((resolve, reject) => {
    const missing = () => new Refusal('upload-missing', 'The request holds no file.');
    let parser: busboy.Busboy;
    try {
      parser = busboy({ headers: req.headers, limits: { files: 1, fields: 0 }, defParamCharset: 'utf8' });
    } catch {
      reject(missing());
      return;
    }
    let received: Promise<UploadedFile> | null = null;
    const fail = (error: unknown) => {
      req.unpipe(parser);
      // What is still coming is read and dropped, so that the client can read the answer.
      req.resume();
      reject(error instanceof Error ? error : new Error(String(error)));
    };
    parser.on('file', (_field, stream, info) => {
      received = files.storeFile(context, actor, files.displayName(info.filename ?? ''), stream).catch(files.refuseUpload);
      received.then(resolve, fail);
    });
    parser.on('error', fail);
    parser.on('close', () => {
      if (received === null) reject(missing());
    });
    req.on('aborted', () => parser.destroy(new Error('the upload broke off')));
    // busboy is the one that ends the file's stream; back-pressure goes through it to the request.
    req.pipe(parser);
  });
}
