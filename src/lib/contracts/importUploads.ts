import { z } from 'zod';
import { importSchema } from './imports';
import { registerRoute } from './registry';

/** Bytes that one part may have at most. */
export const MOST_PART_BYTES = 8 * 1024 * 1024;

const uploadSchema = z.object({
  id: z.number().int(),
  station: z.string(),
  fileName: z.string(),
  bytes: z.number().int().describe('Of the whole file, as announced'),
  offset: z.number().int().describe('Bytes that are durable here: the next part begins there'),
  mark: z.string().nullable(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  import: z
    .number()
    .int()
    .nullable()
    .describe('Number of the import that it became; null before it is finished'),
});
export type Upload = z.output<typeof uploadSchema>;

export const newUploadSchema = z.object({
  station: z.string().min(1, 'say which station the file is of').max(64),
  name: z.string().max(500).default('').describe('What the file is called'),
  bytes: z
    .number('must be the number of bytes of the file')
    .int()
    .min(1, 'must be at least 1')
    .max(2 ** 40, 'is too many')
    .describe('Of the file as it is sent'),
  mark: z
    .string()
    .min(1)
    .max(200, 'must have at most 200 characters')
    .nullable()
    .default(null)
    .describe(
      'Words of your own for this file. Beginning again with the same mark, station and size answers the upload that you began',
    ),
  sha256: z
    .string()
    .regex(/^[0-9a-f]{64}$/i, 'must be 64 hexadecimal digits')
    .nullable()
    .default(null)
    .describe('Of the file, unpacked: what arrived is held against it at the end'),
});
export type NewUpload = z.output<typeof newUploadSchema>;

const base = '/api/v1/networks/{network}/imports/uploads';
const network = z.string();
const params = z.object({ network, id: z.string() });
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const one = z.object({ upload: uploadSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Uploads in parts that are not finished (operator)',
  request: { params: z.object({ network }) },
  responses: { 200: answer('All of them, latest first', z.object({ items: z.array(uploadSchema) })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary:
    'Begin to upload a file in parts, so that a broken line costs one part and not the file (operator)',
  description:
    'Then `PUT …/content` part by part from `offset` on, and `POST …/finish`. After any break ask for `offset` and go on ' +
    'there. Gzip is recognised by its first bytes and unpacked at the end. An upload to which nothing comes for three days is removed.',
  request: {
    params: z.object({ network }),
    body: { content: { 'application/json': { schema: newUploadSchema } } },
  },
  responses: { 201: answer('Begun', one), 200: answer('Begun before, under the same mark', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'How far an upload is: `offset`, also as the header Upload-Offset, and so by HEAD (operator)',
  request: { params },
  responses: { 200: answer('The upload', one) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/{id}/content`,
  summary: 'Send the next part, at most 8 MiB (operator)',
  description:
    '`Content-Range: bytes first-last/whole` says which; `first` must be the upload’s `offset`, otherwise the answer is 409 ' +
    'with the right `offset`. A part counts once it is wholly here and durable. Content-Type: application/octet-stream.',
  request: {
    params,
    headers: z.object({ 'content-range': z.string().describe('Such as bytes 0-1048575/5242880') }),
    body: { content: { 'application/octet-stream': { schema: z.string() } } },
  },
  responses: { 200: answer('Durable so far', one) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/finish`,
  summary: 'Make an import of an upload that is wholly here (operator)',
  description: 'Asked again it answers the same import.',
  request: { params },
  responses: { 201: answer('The import', z.object({ import: importSchema })) },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: `${base}/{id}`,
  summary: 'Give up an upload that is not finished: what came of it is removed (operator)',
  request: { params },
  responses: { 204: { description: 'Removed' } },
});
