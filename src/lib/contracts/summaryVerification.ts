import { z } from 'zod';
import { registerRoute } from './registry';

export const summaryKeySchema = z.object({
  sha256: z.string().describe('Of the SubjectPublicKeyInfo: names the key'),
  pem: z.string().describe('Ed25519 public key'),
  createdAt: z.string(),
  retiredAt: z.string().nullable().describe('It signs nothing any more; what it signed still holds'),
});
export type SummaryKey = z.output<typeof summaryKeySchema>;

export const VERDICTS = ['issued', 'superseded', 'damaged', 'unknown'] as const;

/** What is known of a digest. */
const verificationSchema = z.object({
  sha256: z.string(),
  verdict: z
    .enum(VERDICTS)
    .describe(
      'issued: of the revision in force; superseded: issued, and revised since; damaged: our own record of it does not hold; unknown: nothing with this digest was issued',
    ),
  matches: z.array(
    z.object({
      network: z.object({ slug: z.string(), name: z.string() }),
      month: z.string(),
      revision: z.number().int(),
      latestRevision: z.number().int(),
      issuedAt: z.string(),
      issuedBy: z.string(),
      file: z.string().nullable().describe('Null: the manifest itself'),
      manifestSha256: z.string(),
      signature: z.string().describe('Ed25519 of the manifest, Base64'),
      publicKey: summaryKeySchema,
      isSealIntact: z.boolean().describe('Signature and manifest hold, and the manifest names this digest'),
    }),
  ),
});
export type Verification = z.output<typeof verificationSchema>;

registerRoute({
  access: 'anyone',
  method: 'get',
  path: '/api/v1/summaries/verify',
  summary: 'Whether a file with this digest was issued',
  request: { query: z.object({ sha256: z.string().describe('64 hexadecimal digits') }) },
  responses: {
    200: { description: 'What is known', content: { 'application/json': { schema: verificationSchema } } },
  },
});
registerRoute({
  access: 'anyone',
  method: 'get',
  path: '/api/v1/summaries/keys',
  summary: 'Public keys that a network signs, or signed, its months with',
  request: { query: z.object({ network: z.string() }) },
  responses: {
    200: {
      description: 'The one that signs first',
      content: { 'application/json': { schema: z.object({ items: z.array(summaryKeySchema) }) } },
    },
  },
});
registerRoute({
  access: 'anyone',
  method: 'get',
  path: '/api/v1/summaries/keys/{key}',
  summary: 'A public key as PEM',
  request: { params: z.object({ key: z.string().describe('SHA-256 of the SubjectPublicKeyInfo') }) },
  responses: {
    200: { description: 'The key', content: { 'application/x-pem-file': { schema: z.string() } } },
  },
});
