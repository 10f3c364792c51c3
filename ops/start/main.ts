import { join } from 'node:path';
import { SettingsError, type Config } from '#lib/config/config';
import { config } from '#lib/config/index';
import { closeDb } from '#db/client';
import { migrateUp, NewerSchemaError } from '#db/migrateUp';
import { DEFAULT_DEMO_PASSWORD, DEMO_ACCOUNTS } from '#ops/demo/accounts';
import { Child, runOnce } from './child';
import { ensureFirstAdministrator, hasPeople } from './firstAdministrator';
import { ensureDatabase, OwnDatabase } from './ownDatabase';
import { pageWhileUpgrading } from './pageWhileUpgrading';
import { takenPorts } from './ports';
import { ensureSecrets } from './secrets';
import { untilAnswers } from './untilAnswers';
import { WEB_ARGUMENTS } from './webArguments';
import { WORKER_ARGUMENTS } from './workerArguments';

const isEmpty = process.argv.includes('--empty');
const stoppers: (() => Promise<void>)[] = [];
let isStopping = false;
let own: OwnDatabase | null = null;

process.on('SIGINT', () => void stopAll(0));
process.on('SIGTERM', () => void stopAll(0));

try {
  await start();
} catch (error) {
  console.error(
    error instanceof SettingsError || error instanceof NewerSchemaError
      ? error.message
      : error instanceof Error
        ? (error.stack ?? error.message)
        : error,
  );
  await stopAll(1);
}

async function start(): Promise<void> {
  ensureSecrets(process.env['BITTERN_DATA_DIR'] || '.bittern', process.env);
  const settings = config();
  const isDemo = !isEmpty;
  const taken = await takenPorts(settings);
  if (taken.length > 0) throw new SettingsError(taken);

  await startDatabase(settings);
  const endPage = await pageWhileUpgrading(settings);
  stoppers.push(endPage);
  const account = await migrate();
  const people = await hasPeople();
  if (isEmpty && !people) await ensureFirstAdministrator(settings.firstAdministrator);
  if (isDemo) requireSafeDemo(settings);
  await startStandIns(settings);
  if (isDemo && !people) {
    console.log(`Making the demo: the Merrow estuary, ${settings.demo.days} days up to now …`);
    await runOnce(['--import', 'tsx', 'ops/demo/make.ts']);
  }
  await closeDb();

  await endPage();
  run(settings, 'worker', [...WORKER_ARGUMENTS, 'ingest/worker.ts'], account);
  run(settings, 'web', [...WEB_ARGUMENTS, 'ops/http/server.ts'], account);
  await untilAnswers(`http://${settings.host}:${settings.port}/healthz`, 60_000);
  if (isDemo) run(settings, 'monitors', ['--import', 'tsx', 'ops/demo/monitors.ts']);
  tell(settings, isDemo);
}

async function startDatabase(settings: Config): Promise<void> {
  if (settings.database.isOwn) {
    const started = new OwnDatabase(settings);
    own = started;
    stoppers.push(() => started.stop());
    await started.start();
  }
  await ensureDatabase(settings);
}

/** @returns the settings by which web and worker reach the database; of our own by an account that may not change the audit trail. */
async function migrate(): Promise<Record<string, string>> {
  await migrateUp();
  const account = await own?.makeAppAccount().catch((error: Error) => {
    console.error(
      `Web and worker go on with the owner's account of the database, which may change the audit trail: ${error.message}`,
    );
    return null;
  });
  if (!account) return {};
  return {
    BITTERN_DB_USER: account.user,
    BITTERN_DB_PASSWORD: account.password,
    BITTERN_DB_MIGRATE: 'false',
  };
}

async function startStandIns(settings: Config): Promise<void> {
  if (!settings.standins.areStarted) return;
  const { standins, smtp, dataDir } = settings;
  run(settings, 'tiles', ['--import', 'tsx', 'ops/standins/tiles/server.ts'], {
    BITTERN_TILES_PORT: String(standins.tilesPort),
  });
  run(settings, 'mail', ['--import', 'tsx', 'ops/standins/mail/server.ts'], {
    BITTERN_MAIL_SMTP_PORT: String(smtp.port),
    BITTERN_MAIL_WEB_PORT: String(standins.mailWebPort),
    BITTERN_MAIL_DIR: join(dataDir, 'mail'),
  });
}

function run(
  settings: Config,
  name: string,
  command: string[],
  environment: Record<string, string> = {},
): void {
  const child = new Child(name, command, environment, settings.dataDir);
  stoppers.push(() => child.stop());
  child.start();
}

/** With the password that is printed for everybody to read, the demo stays on this machine. */
function requireSafeDemo({ host, demo }: Config): void {
  const isLoopback = host === 'localhost' || host === '::1' || host.startsWith('127.');
  if (!isLoopback && (demo.password ?? DEFAULT_DEMO_PASSWORD) === DEFAULT_DEMO_PASSWORD) {
    throw new SettingsError([
      'BITTERN_DEMO_PASSWORD: the demo does not listen beyond loopback with its default password; set another, or start with --empty',
    ]);
  }
}

function tell(settings: Config, isDemo: boolean): void {
  console.log(`\nBittern is at ${settings.origin}`);
  if (isDemo) {
    console.log(`Demo accounts, password ${settings.demo.password ?? DEFAULT_DEMO_PASSWORD}:`);
    for (const { email, does } of DEMO_ACCOUNTS) console.log(`  ${email.padEnd(28)} ${does}`);
  }
  if (settings.standins.areStarted) {
    console.log(`Mail that Bittern sends arrives at http://127.0.0.1:${settings.standins.mailWebPort}`);
  }
  console.log(`Logs are in ${join(settings.dataDir, 'log')}. Ctrl-C stops everything.`);
}

async function stopAll(exitCode: number): Promise<void> {
  if (isStopping) return;
  isStopping = true;
  if (exitCode === 0) console.log('\nStopping …');
  await closeDb().catch(() => undefined);
  for (const stop of stoppers.reverse()) await stop().catch((error: Error) => console.error(error.message));
  process.exit(exitCode);
}
