import { z } from 'zod';
import { newPlantFindingSchema, plantCandidatesSchema, plantFindingSchema } from './plantCandidates';
import {
  newPlantSchema,
  newPlantVersionSchema,
  plantRetirementSchema,
  plantSchema,
  plantVersionSchema,
} from './plants';
import { registerRoute } from './registry';

const base = '/api/v1/networks/{network}/plants';
const network = z.string();
const id = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ plant: plantSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Plants of the site by name, retired ones too; `…/plants.csv` as a file',
  request: { params: z.object({ network }) },
  responses: { 200: answer('All of them', z.object({ items: z.array(plantSchema), next: z.null() })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Add a plant (operator)',
  request: { params: z.object({ network }), body: body(newPlantSchema) },
  responses: { 201: answer('The plant', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'A plant with every version of what was noted about it',
  request: { params: z.object({ network, id }) },
  responses: {
    200: answer('The plant', z.object({ plant: plantSchema, versions: z.array(plantVersionSchema) })),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/versions`,
  summary: 'Change what is noted about a plant (operator); the versions before are kept',
  request: { params: z.object({ network, id }), body: body(newPlantVersionSchema) },
  responses: { 201: answer('The plant as changed', one) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/retirement`,
  summary: 'Take a plant out of use or bring it back (operator)',
  request: { params: z.object({ network, id }), body: body(plantRetirementSchema) },
  responses: { 200: answer('The plant', one) },
});

const candidates = '/api/v1/networks/{network}/stations/{code}/plant-candidates';
const ofStation = z.object({ network, code: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: candidates,
  summary: 'Which registered plants could make what stands out of a period’s mean spectrum, with the reason',
  request: { params: ofStation, query: z.object({ from: z.string(), to: z.string() }) },
  responses: { 200: answer('What stands out and the plants, most likely first', plantCandidatesSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: candidates,
  summary: 'Confirm or reject a plant as the source in a period (operator); every finding is kept',
  request: { params: ofStation, body: body(newPlantFindingSchema) },
  responses: { 201: answer('The finding', z.object({ finding: plantFindingSchema })) },
});
