import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { spawn } from 'node:child_process';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Children } from '../../server/boot/children.mjs';
import { isAlive } from '../../server/boot/postgres-leftovers.mjs';

const childrenModule = fileURLToPath(new URL('../../server/boot/children.mjs', import.meta.url));
const forever = 'setInterval(() => {}, 1000)';

let folder;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'tockwell-children-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

describe('Children', () => {
  describe('when they are stopped', () => {
    it('end, the last started first, and none is reported lost', async () => {
      const losses = [];
      const children = new Children((loss) => losses.push(loss));
      const log = path.join(folder, 'order.log');
      const told = (name) =>
        `process.on('SIGTERM', () => { console.log('${name}'); process.exit(0); }); ${forever}; console.log('up')`;
      for (const name of ['first', 'second']) {
        children.start(name, ['-e', told(name)], { env: process.env, logFile: log });
      }
      await expect.poll(() => readFileSync(log, 'utf8')).toBe('up\nup\n');
      await children.stopAll();
      expect(readFileSync(log, 'utf8')).toBe('up\nup\nsecond\nfirst\n');
      expect(losses).toEqual([]);
    });
  });

  describe('when one ends by itself', () => {
    it('is reported with the end of its log', async () => {
      const lost = new Promise((resolve) => {
        const children = new Children(resolve);
        const args = ['-e', "console.error('no room'); process.exit(3)"];
        const logFile = path.join(folder, 'server.log');
        children.start('server', args, { env: process.env, logFile });
      });
      expect((await lost).message).toBe('The server ended by itself (3).');
      expect((await lost).detail).toBe('no room');
    });
  });

  describe('when the launcher is killed outright', () => {
    it('end too', async () => {
      const script = path.join(folder, 'launcher.mjs');
      const child = `['-e', ${JSON.stringify(`console.log(process.pid); ${forever}`)}]`;
      writeFileSync(
        script,
        `import { Children } from ${JSON.stringify(childrenModule)};
         const logFile = ${JSON.stringify(path.join(folder, 'child.log'))};
         new Children(() => {}).start('child', ${child}, { env: process.env, logFile });`,
      );
      const launcher = spawn(process.execPath, [script], { stdio: 'ignore' });
      const pidOf = () => {
        try {
          return Number(readFileSync(path.join(folder, 'child.log'), 'utf8'));
        } catch {
          return 0;
        }
      };
      await expect.poll(pidOf, { timeout: 10_000 }).toBeGreaterThan(0);
      launcher.kill('SIGKILL');
      await expect.poll(() => isAlive(pidOf()), { timeout: 10_000 }).toBe(false);
    });
  });
});
