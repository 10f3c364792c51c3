import { join, resolve } from 'node:path';
import { certificateIn, type Certificate } from './certificate';

export const HEAD_NODES = [1, 2, 3] as const;

/** Everything that a cluster on one machine needs to know of itself. All of it stands in one directory. */
export interface Layout {
  directory: string;
  /** Ports from here on are its own: `PORTS` says which. */
  basePort: number;
  dataServers: number;
  password: string;
  /** Data directories of the databases; elsewhere than `directory` where they need not outlive the machine's run. */
  databases: string;
  /** Whether all connections between its parts are encrypted, by a certificate of its own. */
  hasTls: boolean;
}

const PORTS = {
  head: 0,
  reads: 8,
  http: 9,
  node: 1,
  data: 11,
  group: 21,
  increments: 31,
  transfer: 41,
  web: 51,
};

/** The address of everybody's database: the proxy in front of the head's nodes. */
export const headPort = ({ basePort }: Layout) => basePort + PORTS.head;
/** The address of heavy reads: the proxy in front of the nodes that nobody writes to. */
export const readPort = ({ basePort }: Layout) => basePort + PORTS.reads;
/** The address of everybody's browser and monitor: the proxy in front of the webs. */
export const httpPort = ({ basePort }: Layout) => basePort + PORTS.http;

/** The ports of node 1, 2 or 3 of the head. */
export function nodePorts({ basePort }: Layout, number: number) {
  const at = (offset: number) => basePort + offset + number - 1;
  return {
    sql: at(PORTS.node),
    group: at(PORTS.group),
    increments: at(PORTS.increments),
    transfer: at(PORTS.transfer),
  };
}

export const dataPort = ({ basePort }: Layout, number: number) => basePort + PORTS.data + number - 1;
export const webPort = ({ basePort }: Layout, number: number) => basePort + PORTS.web + number - 1;

/** Numbers of the data servers: 1, 2, … */
export function dataNumbers({ dataServers }: Layout): number[] {
  return Array.from({ length: dataServers }, (_, at) => at + 1);
}

/** The value of `BITTERN_DATA_SERVERS`. */
function dataServersSetting(layout: Layout, numbers = dataNumbers(layout)): string {
  return numbers.map((number) => `data${number}=127.0.0.1:${dataPort(layout, number)}`).join(',');
}

/** The certificate of every server, and the file of options that names it; null where there is no encryption. */
export function certificateOf({ hasTls, databases }: Layout): (Certificate & { options: string }) | null {
  if (!hasTls) return null;
  const directory = join(databases, 'tls');
  return { ...certificateIn(directory, 'cluster'), options: join(directory, 'servers.cnf') };
}

/** What each of Bittern's processes gets to know. */
export function settingsOf(layout: Layout): Record<string, string> {
  const certificate = certificateOf(layout)?.certificate;
  return {
    BITTERN_DB_OWN: 'false',
    BITTERN_DB_HOST: '127.0.0.1',
    BITTERN_DB_PORT: String(headPort(layout)),
    BITTERN_DB_USER: 'bittern',
    BITTERN_DB_PASSWORD: layout.password,
    BITTERN_DATA_SERVERS: dataServersSetting(layout),
    BITTERN_DATA_DIR: join(layout.directory, 'files'),
    ...(certificate !== undefined && { BITTERN_DB_TLS_CA: certificate, BITTERN_DATA_TLS_CA: certificate }),
  };
}

/** A layout in a directory. */
export function layoutIn(
  directory: string,
  given: Pick<Layout, 'basePort' | 'dataServers' | 'password' | 'hasTls'>,
): Layout {
  const absolute = resolve(directory);
  return { ...given, directory: absolute, databases: join(absolute, 'databases') };
}
