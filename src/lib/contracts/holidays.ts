import { z } from 'zod';
import { localDate } from './common';
import { registerRoute } from './registry';

const MOST_HOLIDAYS = 500;

const holidaySchema = z.object({
  date: localDate.describe('Civil date in the zone of the network'),
  name: z.string().trim().min(1, 'must have a name').max(160, 'must have names of at most 160 characters'),
});

export const holidaysSchema = z
  .object({
    items: z
      .array(holidaySchema)
      .max(MOST_HOLIDAYS, `must be at most ${MOST_HOLIDAYS} dates`)
      .describe('The whole list: what is not in it is taken out'),
  })
  .superRefine(({ items }, context) => {
    const dates = new Set<string>();
    for (const { date } of items) {
      if (dates.has(date))
        context.addIssue({ code: 'custom', path: ['items'], message: `must name ${date} once only` });
      dates.add(date);
    }
  });
export type Holidays = z.output<typeof holidaysSchema>;

const path = '/api/v1/networks/{network}/holidays';
const request = { params: z.object({ network: z.string() }) };
const content = { 'application/json': { schema: holidaysSchema } };

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Named dates of the network, which limits may treat as Sundays or leave out',
  request,
  responses: { 200: { description: 'In order of time', content } },
});
registerRoute({
  access: 'person',
  method: 'put',
  path,
  summary: 'Put a list of named dates in the place of the one before (operator)',
  request: { ...request, body: { content } },
  responses: { 200: { description: 'As they are now', content } },
});
