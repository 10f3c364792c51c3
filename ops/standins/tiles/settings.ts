import { z } from 'zod';

const settingsSchema = z.object({
  BITTERN_TILES_HOST: z.string().default('127.0.0.1'),
  BITTERN_TILES_PORT: z.coerce.number().int().min(0).max(65535).default(4331),
  BITTERN_TILES_PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(),
});

export interface TilesSettings {
  host: string;
  /** 0 lets the system choose. */
  port: number;
  /** Address at which browsers reach this server, without a trailing slash; null: the address it listens on. */
  publicUrl: string | null;
}

/** Reads the tile server's settings; an empty value counts as not given. */
export function tilesSettings(environment: Record<string, string | undefined>): TilesSettings {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const settings = settingsSchema.parse(given);
  return {
    host: settings.BITTERN_TILES_HOST,
    port: settings.BITTERN_TILES_PORT,
    publicUrl: settings.BITTERN_TILES_PUBLIC_URL?.replace(/\/+$/, '') ?? null,
  };
}
