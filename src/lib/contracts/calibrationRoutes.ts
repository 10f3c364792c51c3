import { z } from 'zod';
import {
  calibrationSchema,
  calibrationSettingsSchema,
  calibrationWithdrawalSchema,
  doubtDecisionSchema,
  doubtSchema,
  dueCheckSchema,
  newCalibrationSchema,
} from './calibrations';
import { registerRoute } from './registry';

const base = '/api/v1/networks/{network}/calibrations';
const params = z.object({ network: z.string() });
const ofCheck = params.extend({ id: z.string() });
const json = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const answer = (description: string, schema: z.ZodType) => ({ description, ...json(schema) });
const file = (description: string, type: string) => ({
  description,
  content: { [type]: { schema: z.string() } },
});
const check = z.object({ calibration: calibrationSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary:
    'Checks of a network’s instruments, latest first; `?instrument=` for one; `…/calibrations.csv` as a file',
  request: { params, query: z.object({ instrument: z.string().optional() }) },
  responses: {
    200: answer(
      'All of them, withdrawn ones too, and when the next ones are due',
      z.object({ items: z.array(calibrationSchema), due: z.array(dueCheckSchema), next: z.null() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Note a check of an instrument (operator)',
  request: { params, body: json(newCalibrationSchema) },
  responses: { 201: answer('The check', check) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/withdrawal`,
  summary: 'Withdraw a check that was noted by mistake (operator); it is kept as withdrawn',
  request: { params: ofCheck, body: json(calibrationWithdrawalSchema) },
  responses: { 200: answer('The check as withdrawn', check) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/{id}/certificate`,
  summary: 'Keep the certificate of a check: PDF, PNG or JPEG, at most 10 MiB (operator)',
  request: {
    params: ofCheck,
    body: { content: { 'application/octet-stream': { schema: z.string().meta({ format: 'binary' }) } } },
  },
  responses: { 200: answer('The check with its certificate', check) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}/certificate`,
  summary: 'The certificate of a check, as a file to keep',
  request: { params: ofCheck },
  responses: { 200: file('The file', 'application/pdf') },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/settings`,
  summary: 'How the network checks its instruments',
  request: { params },
  responses: { 200: answer('The settings', z.object({ settings: calibrationSettingsSchema })) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/settings`,
  summary: 'Say how the network checks its instruments (operator); checks noted before keep their bound',
  request: { params, body: json(calibrationSettingsSchema) },
  responses: { 200: answer('The settings', z.object({ settings: calibrationSettingsSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/doubts`,
  summary: 'Stretches of data that a drift above the bound made doubtful, latest first',
  request: { params },
  responses: { 200: answer('All of them', z.object({ items: z.array(doubtSchema), next: z.null() })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/doubts`,
  summary: 'Keep or exclude a doubtful stretch, with the reason (operator)',
  request: { params, body: json(doubtDecisionSchema) },
  responses: { 200: answer('The stretch as decided', z.object({ doubt: doubtSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}.ics`,
  summary: 'Due dates as a calendar (RFC 5545), by the token of a calendar feed in `?token=` or as a person',
  request: { params, query: z.object({ token: z.string().optional() }) },
  responses: { 200: file('The calendar', 'text/calendar') },
});
