import { z } from 'zod';
import { shortText } from './common';

/** How long an access token may hold, in days. */
export const ACCESS_TOKEN_DAYS = [7, 30, 90, 365] as const;

/** Families of routes that a token may be made for, by the word after the network in their address. */
export const ROUTE_FAMILIES = {
  stations: [
    'stations',
    'levels',
    'live',
    'map-layers',
    'station-groups',
    'health',
    'spectrum-search',
    'wind',
    'masts',
    'mast-assignments',
  ],
  limits: ['limits', 'holidays', 'exceedances', 'alert-preferences', 'webhooks'],
  complaints: ['complaints'],
  summaries: ['summaries', 'summary-keys', 'summary-preferences', 'summary-settings'],
  upkeep: ['exclusions', 'imports', 'quarantine', 'instruments', 'calibrations'],
  sources: ['plants', 'activities'],
} as const;
export type RouteFamily = keyof typeof ROUTE_FAMILIES;
export const FAMILY_NAMES = Object.keys(ROUTE_FAMILIES) as [RouteFamily, ...RouteFamily[]];

export const newAccessTokenSchema = z.object({
  name: shortText,
  days: z
    .number()
    .refine((days) => (ACCESS_TOKEN_DAYS as readonly number[]).includes(days), 'must be one of the choices'),
  access: z
    .enum(['read', 'change'], 'must be read or change')
    .default('change')
    .describe('read: GET alone; change: whatever the person may'),
  families: z
    .array(z.enum(FAMILY_NAMES, 'must be one of the choices'))
    .min(1, 'must name one at least')
    .nullable()
    .default(null)
    .describe('Families of routes within networks that it opens; null: everything'),
});
export type NewAccessToken = z.output<typeof newAccessTokenSchema>;

/** An access token as its owner sees it: never the secret. */
export const accessTokenSchema = z.object({
  id: z.number().int(),
  name: z.string(),
  access: z.enum(['read', 'change']),
  families: z.array(z.string()).nullable(),
  createdAt: z.string(),
  expiresAt: z.string(),
  lastUsedAt: z.string().nullable(),
  revokedAt: z.string().nullable(),
});
export type AccessToken = z.output<typeof accessTokenSchema>;
