import { isIP } from 'node:net';
import { z } from 'zod';

const port = (fallback: number) => z.coerce.number().int().min(1).max(65535).default(fallback);
const isTrue = (fallback: 'true' | 'false') =>
  z
    .enum(['true', 'false'], { error: 'must be true or false' })
    .default(fallback)
    .transform((text) => text === 'true');
const url = z.url({ protocol: /^https?$/, error: 'must be an http or https address' });

/** The items of a list with commas. */
const itemsOf = (text: string) =>
  text
    .split(',')
    .map((item) => item.trim())
    .filter((item) => item !== '');

/** An IP address, or a block of them such as `10.0.0.0/8`. */
function isAddressBlock(text: string): boolean {
  const [address = '', prefix, ...more] = text.split('/');
  const version = isIP(address);
  const bits = version === 6 ? 128 : 32;
  return (
    version > 0 && more.length === 0 && (!prefix || (/^\d{1,3}$/.test(prefix) && Number(prefix) <= bits))
  );
}

/** How many proxies in front are believed, or the addresses of those that are. */
const trustedProxies = z
  .string()
  .default('0')
  .refine((text) => /^[0-8]$/.test(text.trim()) || itemsOf(text).every(isAddressBlock), {
    error: 'must be a number from 0 to 8, or addresses and blocks such as 10.0.0.5,10.1.0.0/16',
  })
  .transform((text) => (/^\d$/.test(text.trim()) ? Number(text) : itemsOf(text)));

/** Addresses without a path, such as `https://tiles.merrow.example`. */
const origins = z
  .string()
  .default('')
  .transform(itemsOf)
  .refine((items) => items.every((item) => URL.canParse(item) && new URL(item).origin === item), {
    error: 'must be addresses without a path, such as https://tiles.merrow.example',
  });

/** Servers with a name each, such as `data1=127.0.0.1:4601,data2=127.0.0.1:4602`. */
const dataServers = z
  .string()
  .default('')
  .transform(itemsOf)
  .refine((items) => items.every((item) => /^[a-z0-9]{1,20}=[^\s=]+:\d{1,5}$/.test(item)), {
    error: 'must be names with addresses and ports, such as data1=10.0.0.5:3306,data2=10.0.0.6:3306',
  })
  .transform((items) =>
    items.map((item) => {
      const [, name = '', host = '', port = ''] = /^([^=]+)=(.+):(\d+)$/.exec(item) ?? [];
      return { name, host, port: Number(port) };
    }),
  );

/** Every setting of Bittern. The README's settings table lists the same names. */
export const settingsSchema = z.object({
  BITTERN_HOST: z.string().default('127.0.0.1'),
  BITTERN_PORT: port(4321),
  BITTERN_ORIGIN: url.optional(),
  BITTERN_ALLOWED_HOSTS: z.string().default(''),
  BITTERN_TRUSTED_PROXIES: trustedProxies,
  BITTERN_HSTS_DAYS: z.coerce.number().int().min(0).max(3650).default(365),
  BITTERN_SECURITY_CONTACT: z
    .url({ protocol: /^(mailto|https)$/, error: 'must begin with mailto: or https:' })
    .optional(),
  BITTERN_LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
  BITTERN_METRICS_TOKEN: z.string().min(16).optional(),

  BITTERN_DATA_DIR: z.string().default('.bittern'),
  BITTERN_IMPORT_MAX_MIB: z.coerce.number().int().min(1).max(65_536).default(1024),
  BITTERN_POSTS_PER_MINUTE_TOKEN: z.coerce.number().int().min(1).max(10_000_000).default(30_000),
  BITTERN_POSTS_PER_MINUTE_ADDRESS: z.coerce.number().int().min(1).max(10_000_000).default(120_000),
  BITTERN_REQUESTS_PER_MINUTE_ACCOUNT: z.coerce.number().int().min(60).max(10_000_000).default(30_000),
  BITTERN_DB_OWN: isTrue('true'),
  BITTERN_DB_HOST: z.string().default('127.0.0.1'),
  BITTERN_DB_PORT: port(4330),
  BITTERN_DB_TLS_CA: z.string().optional(),
  BITTERN_DB_USER: z.string().default('bittern'),
  BITTERN_DB_PASSWORD: z.string({ error: 'is required' }).min(1),
  BITTERN_DB_NAME: z
    .string()
    .regex(/^[A-Za-z0-9_]{1,64}$/, 'may hold letters, digits and _ only')
    .default('bittern'),
  BITTERN_DISK_WARN_DAYS: z.coerce.number().int().min(1).max(365).default(30),
  BITTERN_DB_READ_HOST: z.string().optional(),
  BITTERN_DB_READ_PORT: port(3306),
  BITTERN_DB_READ_MAX_AGE_SEC: z.coerce.number().int().min(15).max(3600).default(60),
  BITTERN_DATA_SERVERS: dataServers,
  BITTERN_DATA_USER: z.string().optional(),
  BITTERN_DATA_PASSWORD: z.string().optional(),
  BITTERN_DATA_TLS_CA: z
    .string()
    .regex(/^\/[\w./-]+$/, 'must be an absolute path of letters, digits, and _ . - only')
    .optional(),
  BITTERN_DB_MIGRATE: isTrue('true'),
  BITTERN_DB_POOL_MAX: z.coerce.number().int().min(2).max(200).default(12),

  BITTERN_BACKUP_DIR: z.string().optional(),
  BITTERN_BACKUP_KEEP_DAYS: z.coerce.number().int().min(1).max(3650).default(35),
  BITTERN_BACKUP_KEYS_KEEP_DAYS: z.coerce.number().int().min(1).max(31).default(7),
  BITTERN_BACKUP_PASSPHRASE_FILE: z.string().optional(),

  BITTERN_SMTP_HOST: z.string().default('127.0.0.1'),
  BITTERN_SMTP_PORT: port(4325),
  BITTERN_SMTP_SECURE: isTrue('false'),
  BITTERN_SMTP_USER: z.string().optional(),
  BITTERN_SMTP_PASSWORD: z.string().optional(),
  BITTERN_MAIL_FROM: z.string().default('Bittern <bittern@merrow.example>'),

  BITTERN_AUDIT_HEAD_TO: z.email('must be an e-mail address').optional(),
  BITTERN_WEBHOOKS_LOOPBACK: isTrue('false'),

  BITTERN_STANDINS: isTrue('true'),
  BITTERN_MAIL_WEB_PORT: port(4326),
  BITTERN_TILES_PORT: port(4331),
  BITTERN_STYLE_LIGHT_URL: url.optional(),
  BITTERN_STYLE_DARK_URL: url.optional(),
  BITTERN_TILES_PUBLIC_URL: url.optional(),
  BITTERN_MAP_ORIGINS: origins,

  BITTERN_DEMO_PASSWORD: z.string().min(12, 'must have at least 12 characters').optional(),
  BITTERN_DEMO_DAYS: z.coerce.number().int().min(2).max(400).default(70),
  BITTERN_ADMIN_EMAIL: z.email('must be an e-mail address').optional(),
  BITTERN_ADMIN_PASSWORD: z.string().min(12, 'must have at least 12 characters').optional(),
  BITTERN_ADMIN_CHANGES_PASSWORD: isTrue('false'),

  BITTERN_PERSONAL_DATA_KEY: z
    .string({ error: 'is required' })
    .regex(/^[0-9a-f]{64}$/i, 'must be 64 hexadecimal digits (32 bytes)'),
  BITTERN_SESSION_IDLE_HOURS: z.coerce.number().int().min(1).max(720).default(72),
  BITTERN_SESSION_MAX_DAYS: z.coerce.number().int().min(1).max(90).default(30),
});
