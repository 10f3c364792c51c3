import { z } from 'zod';
import { LIVE_EVENT, LIVE_OVER_EVENT } from './liveEvents';
import { registerRoute } from './registry';
import { latestSchema, STATION_STATES } from './stations';

/** A station's newest interval, as it is told while it goes on. */
const liveIntervalSchema = latestSchema.extend({
  code: z.string().describe('The station’s code'),
  state: z.enum(STATION_STATES),
});
export type LiveInterval = z.output<typeof liveIntervalSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/live',
  summary: 'What the stations of a network measure, as it arrives (server-sent events)',
  description:
    `An \`${LIVE_EVENT}\` event for every station at the beginning, then whenever a station’s newest interval or state changes, ` +
    `within two seconds. Its data are one JSON object of the schema. \`${LIVE_OVER_EVENT}\` says that the caller may not ` +
    'listen any longer. Listeners are bounded: 429 (ten for a person) or 503 with Retry-After; ask `stations` from time to time instead.',
  request: { params: z.object({ network: z.string() }) },
  responses: {
    200: {
      description: 'Events until either side ends them',
      content: { 'text/event-stream': { schema: liveIntervalSchema } },
    },
  },
});
