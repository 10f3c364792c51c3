import { mkdirSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { HEAD_NODES, headPort, httpPort, nodePorts, readPort, webPort, type Layout } from './layout';
import { pidOf, startProcess } from './processes';

export const WEBS = [1, 2] as const;

/** Starts the proxy in front of the head's nodes and of the webs, unless it runs. */
export function startProxy(layout: Layout): void {
  if (pidOf(layout, 'proxy') !== null) return;
  mkdirSync(layout.directory, { recursive: true });
  const path = join(layout.directory, 'haproxy.cfg');
  writeFileSync(path, proxyText(layout));
  startProcess(layout, 'proxy', ['haproxy', '-db', '-f', path]);
}

/**
 * The proxy's configuration. A node's check may take as long as its interval: a busy machine is not a dead one. All write to the same node while it lives, so that they meet each other's locks instead of conflicts at commit
 * (decision 0091); the next takes over, and what was connected to the first is cut off at once. Heavy reads go to the others.
 */
function proxyText(layout: Layout): string {
  const nodes = HEAD_NODES.map(
    (number) =>
      `  server head${number} 127.0.0.1:${nodePorts(layout, number).sql} check inter 3s fastinter 2s downinter 2s fall 2 rise 2 on-marked-down shutdown-sessions${number === 1 ? '' : ' backup'}`,
  );
  const readNodes = HEAD_NODES.map(
    (number) =>
      `  server head${number} 127.0.0.1:${nodePorts(layout, number).sql} track head/head${number} on-marked-down shutdown-sessions${number === 1 ? ' backup' : ''}`,
  );
  const webs = WEBS.map(
    (number) => `  server web${number} 127.0.0.1:${webPort(layout, number)} check inter 1s fall 2 rise 1`,
  );
  return `global
  maxconn 4000
  external-check
  insecure-fork-wanted
  stats socket ${join(layout.directory, 'proxy.sock')} mode 600 level operator

defaults
  timeout connect 2s
  timeout client 1h
  timeout server 1h
  timeout check 5s

listen head
  mode tcp
  bind 127.0.0.1:${headPort(layout)}
  option external-check
  external-check path "/usr/bin:/bin"
  external-check command ${resolve('ops/cluster/checkNode.sh')}
${nodes.join('\n')}

listen reads
  mode tcp
  bind 127.0.0.1:${readPort(layout)}
  balance leastconn
${readNodes.join('\n')}

listen web
  mode http
  bind 127.0.0.1:${httpPort(layout)}
  balance roundrobin
  option forwardfor
  option httpchk
  http-check send meth GET uri /healthz ver HTTP/1.1 hdr Host 127.0.0.1:${httpPort(layout)}
  option redispatch
  retries 3
  # Only what never reached a web is asked of another one.
  retry-on conn-failure
${webs.join('\n')}
`;
}
