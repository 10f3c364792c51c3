import { z } from 'zod';
import { localDate } from './common';
import { registerRoute } from './registry';

/** Largest photo that is taken. */
export const MOST_PHOTO_BYTES = 8 * 1024 * 1024;

/** Photos that a station may have. */
export const MOST_PHOTOS = 24;

/** Kinds of photo that are taken, told by their bytes. */
const PHOTO_TYPES = ['image/jpeg', 'image/png'] as const;
export type PhotoType = (typeof PHOTO_TYPES)[number];

export const newPhotoSchema = z.object({
  caption: z
    .string('must be text')
    .trim()
    .min(1, 'must say what the photo shows')
    .max(300, 'must have at most 300 characters'),
  takenOn: localDate.describe('The day on which it was taken'),
});
export type NewPhoto = z.output<typeof newPhotoSchema>;

const photoSchema = z.object({
  id: z.number().int(),
  caption: z.string(),
  takenOn: z.string(),
  type: z.enum(PHOTO_TYPES),
  bytes: z.number().int(),
  uploadedAt: z.string(),
  uploadedBy: z.string().nullable(),
});
export type Photo = z.output<typeof photoSchema>;

const path = '/api/v1/networks/{network}/stations/{code}/photos';
const ofStation = { params: z.object({ network: z.string(), code: z.string() }) };
const ofPhoto = { params: z.object({ network: z.string(), code: z.string(), id: z.string() }) };
const file = { schema: z.string().meta({ format: 'binary' }) };
const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Photos of a station, latest first',
  request: ofStation,
  responses: {
    200: { description: 'The photos', ...jsonOf(z.object({ items: z.array(photoSchema), next: z.null() })) },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path,
  summary: 'Add a photo (operator); what it tells beside the picture, such as its place, is not kept',
  request: {
    ...ofStation,
    query: newPhotoSchema,
    body: { content: { 'image/jpeg': file, 'image/png': file } },
  },
  responses: { 201: { description: 'The photo', ...jsonOf(z.object({ photo: photoSchema })) } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${path}/{id}`,
  summary: 'The picture',
  request: ofPhoto,
  responses: { 200: { description: 'The picture', content: { 'image/jpeg': file, 'image/png': file } } },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: `${path}/{id}`,
  summary: 'Delete a photo for good (operator)',
  request: ofPhoto,
  responses: { 204: { description: 'It is gone' } },
});
