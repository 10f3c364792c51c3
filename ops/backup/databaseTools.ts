import { KINDS } from '#db/sharding/kinds';
import type { Config } from '#lib/config/config';
import { startTool, type Tool } from './tool';

/**
 * Starts a dump of all tables as one transaction sees them, rows by their key, so that the same rows always come out the same. Binary
 * columns come as hexadecimal digits and line ends escaped: a row is a line.
 */
export function startDump({ database }: Config, hasBinaryLog = false): Tool {
  const args = [
    '--single-transaction',
    '--quick',
    '--order-by-primary',
    '--complete-insert',
    '--hex-blob',
    '--skip-comments',
    '--skip-add-locks',
    '--skip-disable-keys',
    '--no-tablespaces',
    // Rows that the head reaches through links count, too; without this the dump passes them over silently.
    '--skip-no-data-med',
    '--max-allowed-packet=64M',
    // What a move of a bucket that was broken off has left at the head.
    ...KINDS.flatMap((kind) => [
      `--ignore-table=${database.name}.${kind}__linked`,
      `--ignore-table=${database.name}.${kind}__left`,
    ]),
    ...(hasBinaryLog ? ['--master-data=2'] : []),
    database.name,
  ];
  return startClient('mariadb-dump', database, args);
}

/** Starts a client that carries out the statements it is given, and ends at the first that fails. */
export function startLoad({ database }: Config): Tool {
  return startClient('mariadb', database, ['--batch', '--max-allowed-packet=64M', database.name]);
}

function startClient(command: string, database: Config['database'], args: string[]): Tool {
  const { host, port, user, password, tlsCaFile } = database;
  const reached = ['--no-defaults', '--protocol=tcp', `--host=${host}`, `--port=${port}`, `--user=${user}`];
  const protectedBy = tlsCaFile === null ? [] : [`--ssl-ca=${tlsCaFile}`, '--ssl-verify-server-cert'];
  // The environment of a process is its owner's alone; its arguments are everybody's.
  return startTool(command, [...reached, ...protectedBy, '--default-character-set=utf8mb4', ...args], {
    environment: { MYSQL_PWD: password },
  });
}
