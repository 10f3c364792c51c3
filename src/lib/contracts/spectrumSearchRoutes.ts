import { z } from 'zod';
import { registerRoute } from './registry';
import { spectrumSearchOptionsSchema, spectrumSearchSchema } from './spectrumSearch';

const base = '/api/v1/networks/{network}/spectrum-search';
const request = {
  params: z.object({ network: z.string() }),
  query: spectrumSearchOptionsSchema.extend({
    station: z.string().describe('Code of the station that the spectrum is from'),
    from: z.string().describe('Beginning of the period whose mean spectrum is looked for'),
    to: z.string(),
    since: z.string().optional().describe('Beginning of what is searched; a year before `until` if left out'),
    until: z.string().optional().describe('End of what is searched; now if left out'),
    stations: z.string().optional().describe('Codes, separated by commas; all if left out'),
  }),
};

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Minutes of all stations and dates that have the spectral shape of a period',
  description:
    'Shapes are compared about their own mean; what was at the station in the period itself is not found. The cost grows with days ' +
    'times stations. With `Accept: text/event-stream` events `progress` (`{"done","all"}` in station-days) come before `result`; ' +
    'closing the connection cancels the search. `…/spectrum-search.csv` has the spells as a file.',
  request,
  responses: {
    200: { description: 'Spells', content: { 'application/json': { schema: spectrumSearchSchema } } },
  },
});
