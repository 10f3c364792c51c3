import type { Config } from '#lib/config/config';
import { requireFreePort } from '#ops/database/server';

/** Every port that a start takes, with the setting that moves it. */
function portsOf(config: Config): { port: number; setting: string }[] {
  const ports = [{ port: config.port, setting: 'BITTERN_PORT' }];
  if (config.database.isOwn) ports.push({ port: config.database.port, setting: 'BITTERN_DB_PORT' });
  if (config.standins.areStarted) {
    ports.push(
      { port: config.smtp.port, setting: 'BITTERN_SMTP_PORT' },
      { port: config.standins.mailWebPort, setting: 'BITTERN_MAIL_WEB_PORT' },
      { port: config.standins.tilesPort, setting: 'BITTERN_TILES_PORT' },
    );
  }
  return ports;
}

/** Every port that somebody else has, in words with the way out; empty when all are free. */
export async function takenPorts(config: Config): Promise<string[]> {
  const checks = portsOf(config).map(async ({ port, setting }) =>
    requireFreePort(port).then(
      () => null,
      () => `Port ${port} is taken. Stop what listens there, or choose another port by ${setting}.`,
    ),
  );
  return (await Promise.all(checks)).filter((problem) => problem !== null);
}
