import { z } from 'zod';
import { alertPreferencesSchema, DELIVERIES } from './alerts';
import { registerRoute } from './registry';

const clock = (description: string) => z.string().nullable().describe(description);

/** How a person is told, as the interface shows it. */
const ownAlertsSchema = z.object({
  preferences: z.object({
    delivery: z.enum(DELIVERIES),
    dailyAt: z.string().describe('Local time, "07:00"'),
    groupMinutes: z.number().int(),
    quietFrom: clock('Local time; null: no quiet hours'),
    quietTo: clock('Local time, over midnight where it is earlier than its beginning'),
    override: z.number().nullable().describe('dB above the limit'),
    stations: z.array(z.string()).nullable().describe('Codes; null: every station'),
    warnsEarly: z.boolean(),
  }),
  namingLimits: z
    .array(z.string())
    .describe('Limits that name the person’s address: nothing is sent without one'),
});
export type OwnAlertsAnswer = z.output<typeof ownAlertsSchema>;

export const newWebhookSchema = z.object({
  url: z.string('must be an address').max(500, 'must have at most 500 characters'),
});

const webhookSchema = z.object({
  id: z.number().int(),
  url: z.string(),
  state: z.enum(['working', 'failing', 'given-up']),
  failures: z.number().int().describe('Attempts that failed, one after the other'),
  failingSince: z.string().nullable(),
  nextAttemptAt: z.string().nullable().describe('While it fails'),
  problem: z.string().nullable().describe('Why it was given up'),
  createdAt: z.string(),
  createdBy: z.string().nullable(),
});
export type Webhook = z.output<typeof webhookSchema>;

const deliverySchema = z.object({
  id: z.string().describe('The `id` in the body of what was posted'),
  webhook: z.number().int(),
  event: z.string(),
  state: z.enum(['waiting', 'delivered', 'dead']),
  attempts: z.number().int(),
  outcome: z.string().nullable().describe('Of the last attempt'),
  createdAt: z.string(),
  lastAttemptAt: z.string().nullable(),
});
export type WebhookDelivery = z.output<typeof deliverySchema>;

const base = '/api/v1/networks/{network}';
const network = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/alert-preferences`,
  summary: 'How you are told of the network’s exceedances by e-mail',
  request: { params: z.object({ network }) },
  responses: { 200: answer('Yours', ownAlertsSchema) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/alert-preferences`,
  summary: 'Set how you are told, from what is found from now on',
  request: { params: z.object({ network }), body: body(alertPreferencesSchema) },
  responses: { 200: answer('As they are now', ownAlertsSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/webhooks`,
  summary: 'Webhooks of the network, and what was posted to them last (operator)',
  request: { params: z.object({ network }) },
  responses: {
    200: answer(
      'Oldest first; deliveries latest first',
      z.object({ items: z.array(webhookSchema), deliveries: z.array(deliverySchema) }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/webhooks`,
  summary: 'Add a webhook (operator)',
  request: { params: z.object({ network }), body: body(newWebhookSchema) },
  responses: {
    201: answer(
      'With the secret that its receiver checks signatures with, told this once',
      z.object({
        webhook: webhookSchema,
        secret: z
          .string()
          .describe(
            'Base64 of the 32 bytes that every post is signed under: HTTP message signature (RFC 9421) `bittern`, hmac-sha256, over ' +
              '`@method`, `@target-uri` and `content-digest` (RFC 9530, sha-256)',
          ),
      }),
    ),
  },
});
for (const [act, summary] of [
  ['end', 'End a webhook for good: what waits for it is not posted (operator)'],
  ['retry', 'Have a webhook tried again at once, also one that was given up (operator)'],
  ['test', 'Have a test posted to a webhook, which says nothing but that it is one (operator)'],
] as const) {
  registerRoute({
    access: 'person',
    method: 'post',
    path: `${base}/webhooks/{id}/${act}`,
    summary,
    request: { params: z.object({ network, id: z.string() }) },
    responses: { 204: { description: 'Done' } },
  });
}
