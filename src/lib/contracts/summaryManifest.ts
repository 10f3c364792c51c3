import { z } from 'zod';
import { conventionSchema, month } from './summaries';

/** Changes when a reader of the manifest has to. */
export const MANIFEST_FORM = 'bittern-seal-1';

const sha256 = z
  .string()
  .regex(/^[0-9a-f]{64}$/)
  .describe('SHA-256, 64 lower-case hexadecimal digits');

export const manifestFileSchema = z.object({
  format: z.string(),
  name: z.string(),
  mediaType: z.string(),
  bytes: z.number().int(),
  sha256,
});
export type ManifestFile = z.output<typeof manifestFileSchema>;

const yearDigestSchema = z
  .object({
    from: z.string().describe('The year’s first midnight'),
    to: z.string().describe('Beginning of the month'),
    sha256: sha256.describe(
      'Over the lines `code month hours periods sha256` and a line feed, by code and month',
    ),
    stations: z.array(
      z.object({
        code: z.string(),
        months: z.array(
          z.object({
            month,
            hours: z.number().int().describe('With valid time'),
            periods: z.number().int().describe('Days, evenings and nights that begin in it, with valid time'),
            sha256: sha256.describe('Over a line for each of its hours, and then for each of its periods'),
          }),
        ),
      }),
    ),
  })
  .describe('Of the sums of the months before, which the year to date is pooled from');
export type YearDigest = z.output<typeof yearDigestSchema>;

const dataDigestSchema = z
  .object({
    from: z.string().describe('Beginning of the first interval’s span: the earlier of month and first day'),
    to: z.string().describe('End: the later of the month and its last night'),
    sha256: sha256.describe('Over the lines `code intervals sha256` and a line feed, by code'),
    stations: z.array(z.object({ code: z.string(), intervals: z.number().int(), sha256 })),
    year: yearDigestSchema.optional().describe('Missing in months that were issued before it was told'),
  })
  .describe('Of every stored interval that overlaps the span, in order of time, as packed by record form 1');
export type DataDigest = z.output<typeof dataDigestSchema>;

/** What is signed when a month is issued: its very bytes, UTF-8 JSON that ends with a line feed. */
export const summaryManifestSchema = z.object({
  form: z.literal(MANIFEST_FORM),
  network: z.object({ slug: z.string(), name: z.string() }),
  month,
  revision: z.number().int(),
  supersedes: z
    .object({ revision: z.number().int(), manifestSha256: sha256 })
    .nullable()
    .describe('The revision that this one takes the place of'),
  issuedAt: z.string(),
  issuedBy: z.string(),
  files: z.array(manifestFileSchema),
  data: dataDigestSchema,
  limits: z
    .array(z.object({ id: z.number().int(), version: z.number().int() }))
    .describe('Versions in force at some time of the month'),
  settings: z.array(conventionSchema).describe('Of the network, as far as they hold in the month'),
  template: z.number().int().describe('Version of the template; 0: none was set'),
  software: z.string(),
  auditHead: z
    .object({ position: z.number().int(), sha256 })
    .describe('Head of the audit chain when the files were made; the act of issuing comes after it'),
  publicKey: sha256.describe('Of the network’s Ed25519 public key as SubjectPublicKeyInfo'),
});
export type SummaryManifest = z.output<typeof summaryManifestSchema>;
