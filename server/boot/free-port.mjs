import { createServer } from 'node:net';
import path from 'node:path';
import { readJson, writeJson } from './project.mjs';

const loopback = '127.0.0.1';

/** True when nothing listens on this port of the loopback address. */
export function isFree(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(port, loopback, () => probe.close(() => resolve(true)));
  });
}

/** A port the system says is free now. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, loopback, () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

/**
 * The port a service had last time, so that links kept in orders and mails stay good; another when
 * that one is taken.
 */
export async function rememberedPort(dataDir, service) {
  const file = path.join(dataDir, 'ports.json');
  const ports = readJson(file) ?? {};
  const others = Object.entries(ports).filter(([name]) => name !== service);
  const clash = others.some(([, port]) => port === ports[service]);
  if (ports[service] && !clash && (await isFree(ports[service]))) return ports[service];
  const port = await freePort();
  writeJson(file, { ...ports, [service]: port });
  return port;
}
