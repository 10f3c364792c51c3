import { createServer, type AddressInfo } from 'node:net';

/** Ports on loopback on which nothing listens. */
export async function freePorts(count: number): Promise<number[]> {
  const probes = Array.from({ length: count }, () => createServer());
  await Promise.all(probes.map((probe) => new Promise<void>((done) => probe.listen(0, '127.0.0.1', done))));
  const ports = probes.map((probe) => (probe.address() as AddressInfo).port);
  await Promise.all(probes.map((probe) => new Promise((done) => probe.close(done))));
  return ports;
}
