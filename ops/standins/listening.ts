import type { Server } from 'node:net';

const CLOSE_WITHIN_MS = 5000;

/**
 * Listens, or ends the process with words that name the setting to change.
 * @param setting the environment variable that moves the port
 */
export async function listen(server: Server, host: string, port: number, setting: string): Promise<void> {
  try {
    await new Promise<void>((resolve, reject) => {
      server.once('error', reject);
      server.listen(port, host, () => {
        server.off('error', reject);
        resolve();
      });
    });
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    console.error(
      code === 'EADDRINUSE'
        ? `Port ${port} is taken. Stop what listens there, or choose another port by ${setting}.`
        : `Cannot listen on ${host}:${port} (${setting}): ${error instanceof Error ? error.message : String(error)}`,
    );
    process.exit(1);
  }
}

/** The address at which a listening server is reached. */
export function urlOf(server: Server): string {
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('The server does not listen yet.');
  const host = address.family === 'IPv6' ? `[${address.address}]` : address.address;
  return `http://${host}:${address.port}`;
}

/** On SIGTERM or SIGINT, closes what listens, and ends; lines that stay open are cut after some seconds. */
export function stopOnSignal(servers: { close(done: () => void): unknown }[]): void {
  const stop = () => {
    setTimeout(() => process.exit(0), CLOSE_WITHIN_MS).unref();
    void Promise.all(servers.map((server) => new Promise<void>((done) => server.close(done)))).then(() =>
      process.exit(0),
    );
  };
  process.once('SIGTERM', stop);
  process.once('SIGINT', stop);
}
