import { z } from 'zod';
import { registerRoute } from './registry';
import { stationFiguresSchema } from './summaryLife';

/** A month of a network as months are compared. */
const trendMonthSchema = z.object({
  month: z.string(),
  revision: z.number().int().nullable().describe('Issued; null: the figures of the draft'),
  stations: z.array(stationFiguresSchema),
});
export type TrendMonth = z.output<typeof trendMonthSchema>;

export const summaryPreferencesSchema = z.object({
  isTold: z.boolean('must be true or false').describe('By e-mail when a month is issued or revised'),
});

const network = '/api/v1/networks/{network}';
const params = z.object({ network: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: `${network}/summaries/trend`,
  summary: 'Levels of every drafted or issued month by station, earliest first',
  request: { params },
  responses: {
    200: {
      description: 'Of the latest issued revision of each month; of the draft where none is issued',
      content: { 'application/json': { schema: z.object({ items: z.array(trendMonthSchema) }) } },
    },
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${network}/summaries/trend.csv`,
  summary: 'The same as CSV, one month and station a line',
  request: { params },
  responses: { 200: { description: 'CSV', content: { 'text/csv': { schema: z.string() } } } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${network}/summaries/archive.zip`,
  summary: 'Files of issued months with their seals, as one ZIP',
  request: {
    params,
    query: z.object({
      month: z.string().describe('Repeated: months such as 2026-03, at most 60'),
      format: z.string().optional().describe('Repeated: pdf, xlsx, csv or json; all when left out'),
    }),
  },
  responses: { 200: { description: 'ZIP', content: { 'application/zip': { schema: z.string() } } } },
});
for (const method of ['get', 'put'] as const) {
  registerRoute({
    access: 'person',
    method,
    path: `${network}/summary-preferences`,
    summary:
      method === 'get' ? 'What you are told of issued months' : 'Choose what you are told of issued months',
    request: {
      params,
      ...(method === 'put'
        ? { body: { content: { 'application/json': { schema: summaryPreferencesSchema } } } }
        : {}),
    },
    responses: {
      200: {
        description: 'As it holds',
        content: { 'application/json': { schema: summaryPreferencesSchema } },
      },
    },
  });
}
