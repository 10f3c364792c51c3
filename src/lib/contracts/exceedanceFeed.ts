import { z } from 'zod';
import { EXCEEDANCE_STATES } from './exceedances';
import { registerRoute } from './registry';

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/exceedances.atom',
  summary: 'The latest exceedances as an Atom feed; a person’s feed token in the address opens it, too',
  request: {
    params: z.object({ network: z.string() }),
    query: z.object({
      token: z.string().optional().describe('Of the feed’s own address, made on the network’s alerts page'),
      station: z.string().optional().describe('Code'),
      limitId: z.string().optional(),
      state: z.enum(EXCEEDANCE_STATES).optional(),
      acknowledged: z.enum(['yes', 'no']).optional(),
      from: z.string().optional(),
      to: z.string().optional(),
    }),
  },
  responses: {
    200: { description: 'The feed', content: { 'application/atom+xml': { schema: z.string() } } },
  },
});
