import { join } from 'node:path';
import { settingsSchema } from './schema';

/** The settings in typed form, as the rest of the program reads them. */
export interface Config {
  host: string;
  port: number;
  /** Address that people type, without a trailing slash; links in e-mail begin with it. */
  origin: string;
  allowedHosts: string[];
  /** How many proxies in front are believed about a caller's address, or the addresses and blocks of those that are. */
  trustedProxies: number | string[];
  /** For how long browsers keep to https, in days; 0: not asked for. */
  hstsDays: number;
  /** Where to tell of weaknesses, for `/.well-known/security.txt`. */
  securityContact: string | null;
  logLevel: string;
  metricsToken: string | null;
  dataDir: string;
  /** Operators are warned when the disk will be full within so many days. */
  diskWarnDays: number;
  /** Largest file of intervals that may be uploaded. */
  importMostBytes: number;
  /** What each web process takes from monitors in a minute. */
  receiving: { postsPerMinuteOfToken: number; postsPerMinuteOfAddress: number };
  /** `isOwn`: `ops/start.sh` starts a MariaDB of its own in the data directory. */
  /** Pages and routes of one account that each web process answers in a minute. */
  requestsPerMinuteOfAccount: number;
  database: {
    isOwn: boolean;
    host: string;
    port: number;
    user: string;
    password: string;
    name: string;
    poolMax: number;
    /** A file of the certificates that vouch for the database's; null: it is reached without TLS. */
    tlsCaFile: string | null;
    /** A replica that heavy reads go to while it is at most so far behind; null: they go where everything goes. */
    replica: { host: string; port: number; mostAgeSec: number } | null;
    /** Servers that the high-volume tables are shared out to; none: they are local. */
    dataServers: { name: string; host: string; port: number }[];
    /** The account on them, of the head and of migrations. */
    dataUser: string;
    dataPassword: string;
    /** Vouches for the data servers' certificates, on this machine and at the same path on the head's; null: they are reached without TLS. */
    dataTlsCaFile: string | null;
    /** The web applies pending migrations when it starts. */
    mayMigrate: boolean;
  };
  /** Where backups go and how long they stay; `keysKeepDays` is for what lets personal data be read. */
  backup: { dir: string; keepDays: number; keysKeepDays: number; passphraseFile: string | null };
  smtp: {
    host: string;
    port: number;
    isSecure: boolean;
    user: string | null;
    password: string | null;
    from: string;
  };
  /** Who is sent the head of the audit trail each day. */
  auditHeadTo: string | null;
  /** Whether webhooks may lead to this machine itself, by http too; else https to public addresses only. */
  webhooksMayLoopBack: boolean;
  mapStyleUrls: { light: string; dark: string };
  /** Where browsers may get styles, tiles, glyphs and icons of maps from. */
  mapOrigins: string[];
  /** Local stand-ins for the hosted mail and tile services. */
  standins: { areStarted: boolean; mailWebPort: number; tilesPort: number };
  demo: { password: string | null; days: number };
  firstAdministrator: { email: string | null; password: string | null; changesPassword: boolean };
  /** 32 bytes that wrap the key of each complaint's personal data. Kept outside backups. */
  personalDataKey: Buffer;
  session: { idleHours: number; maxDays: number };
}

/** All settings that are wrong or missing, told together. */
export class SettingsError extends Error {
  constructor(readonly problems: string[]) {
    super(
      `Bittern cannot start, these settings need attention:\n${problems.map((p) => `  ${p}`).join('\n')}`,
    );
    this.name = 'SettingsError';
  }
}

/**
 * Reads the settings from an environment.
 * @throws {SettingsError} listing every bad setting at once.
 */
export function parseConfig(environment: Record<string, string | undefined>): Config {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const parsed = settingsSchema.safeParse(given);
  if (!parsed.success) {
    throw new SettingsError(
      parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).sort(),
    );
  }
  const settings = parsed.data;
  const origin = new URL(
    settings.BITTERN_ORIGIN ?? `http://${settings.BITTERN_HOST}:${settings.BITTERN_PORT}`,
  );
  const tilesUrl = `http://127.0.0.1:${settings.BITTERN_TILES_PORT}`;
  const mapStyleUrls = {
    light: settings.BITTERN_STYLE_LIGHT_URL ?? `${tilesUrl}/style/light.json`,
    dark: settings.BITTERN_STYLE_DARK_URL ?? `${tilesUrl}/style/dark.json`,
  };
  const mapUrls = [...Object.values(mapStyleUrls), settings.BITTERN_TILES_PUBLIC_URL ?? []].flat();
  return {
    host: settings.BITTERN_HOST,
    port: settings.BITTERN_PORT,
    origin: origin.origin,
    allowedHosts: allowedHosts(origin, settings.BITTERN_PORT, settings.BITTERN_ALLOWED_HOSTS),
    trustedProxies: settings.BITTERN_TRUSTED_PROXIES,
    hstsDays: settings.BITTERN_HSTS_DAYS,
    securityContact: settings.BITTERN_SECURITY_CONTACT ?? null,
    logLevel: settings.BITTERN_LOG_LEVEL,
    metricsToken: settings.BITTERN_METRICS_TOKEN ?? null,
    dataDir: settings.BITTERN_DATA_DIR,
    diskWarnDays: settings.BITTERN_DISK_WARN_DAYS,
    importMostBytes: settings.BITTERN_IMPORT_MAX_MIB * 1024 * 1024,
    receiving: {
      postsPerMinuteOfToken: settings.BITTERN_POSTS_PER_MINUTE_TOKEN,
      postsPerMinuteOfAddress: settings.BITTERN_POSTS_PER_MINUTE_ADDRESS,
    },
    requestsPerMinuteOfAccount: settings.BITTERN_REQUESTS_PER_MINUTE_ACCOUNT,
    database: {
      isOwn: settings.BITTERN_DB_OWN,
      host: settings.BITTERN_DB_HOST,
      port: settings.BITTERN_DB_PORT,
      user: settings.BITTERN_DB_USER,
      password: settings.BITTERN_DB_PASSWORD,
      name: settings.BITTERN_DB_NAME,
      poolMax: settings.BITTERN_DB_POOL_MAX,
      tlsCaFile: settings.BITTERN_DB_TLS_CA ?? null,
      replica: settings.BITTERN_DB_READ_HOST
        ? {
            host: settings.BITTERN_DB_READ_HOST,
            port: settings.BITTERN_DB_READ_PORT,
            mostAgeSec: settings.BITTERN_DB_READ_MAX_AGE_SEC,
          }
        : null,
      dataServers: settings.BITTERN_DATA_SERVERS,
      dataUser: settings.BITTERN_DATA_USER ?? settings.BITTERN_DB_USER,
      dataPassword: settings.BITTERN_DATA_PASSWORD ?? settings.BITTERN_DB_PASSWORD,
      dataTlsCaFile: settings.BITTERN_DATA_TLS_CA ?? null,
      mayMigrate: settings.BITTERN_DB_MIGRATE,
    },
    backup: {
      dir: settings.BITTERN_BACKUP_DIR ?? join(settings.BITTERN_DATA_DIR, 'backups'),
      keepDays: settings.BITTERN_BACKUP_KEEP_DAYS,
      keysKeepDays: settings.BITTERN_BACKUP_KEYS_KEEP_DAYS,
      passphraseFile: settings.BITTERN_BACKUP_PASSPHRASE_FILE ?? null,
    },
    smtp: {
      host: settings.BITTERN_SMTP_HOST,
      port: settings.BITTERN_SMTP_PORT,
      isSecure: settings.BITTERN_SMTP_SECURE,
      user: settings.BITTERN_SMTP_USER ?? null,
      password: settings.BITTERN_SMTP_PASSWORD ?? null,
      from: settings.BITTERN_MAIL_FROM,
    },
    mapStyleUrls,
    mapOrigins: [...new Set([...mapUrls.map((url) => new URL(url).origin), ...settings.BITTERN_MAP_ORIGINS])],
    standins: {
      areStarted: settings.BITTERN_STANDINS,
      mailWebPort: settings.BITTERN_MAIL_WEB_PORT,
      tilesPort: settings.BITTERN_TILES_PORT,
    },
    demo: { password: settings.BITTERN_DEMO_PASSWORD ?? null, days: settings.BITTERN_DEMO_DAYS },
    firstAdministrator: {
      email: settings.BITTERN_ADMIN_EMAIL ?? null,
      password: settings.BITTERN_ADMIN_PASSWORD ?? null,
      changesPassword: settings.BITTERN_ADMIN_CHANGES_PASSWORD,
    },
    auditHeadTo: settings.BITTERN_AUDIT_HEAD_TO ?? null,
    webhooksMayLoopBack: settings.BITTERN_WEBHOOKS_LOOPBACK,
    personalDataKey: Buffer.from(settings.BITTERN_PERSONAL_DATA_KEY, 'hex'),
    session: { idleHours: settings.BITTERN_SESSION_IDLE_HOURS, maxDays: settings.BITTERN_SESSION_MAX_DAYS },
  };
}

function allowedHosts(origin: URL, port: number, extra: string): string[] {
  const named = extra.split(',').map((host) => host.trim().toLowerCase());
  return [origin.host, `127.0.0.1:${port}`, `localhost:${port}`, ...named].filter((host) => host !== '');
}
