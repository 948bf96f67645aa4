import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { freePort, isFree, rememberedPort } from '../../server/boot/free-port.mjs';
import { choosePort } from '../../server/boot/shop.mjs';

let folder;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'tockwell-ports-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

async function whileTaken(port, work) {
  const taker = createServer();
  await new Promise((done) => taker.listen(port, '127.0.0.1', done));
  await work();
  await new Promise((done) => taker.close(done));
}

describe('rememberedPort', () => {
  describe('when the port of last time is free', () => {
    it('is the same again, and another for another service', async () => {
      const first = await rememberedPort(folder, 'mail');
      expect(await rememberedPort(folder, 'mail')).toBe(first);
      expect(await rememberedPort(folder, 'payments')).not.toBe(first);
    });
  });

  describe('when somebody else has taken it', () => {
    it('is another one, which is remembered from then on', async () => {
      const first = await rememberedPort(folder, 'mail');
      await whileTaken(first, async () => {
        const second = await rememberedPort(folder, 'mail');
        expect(second).not.toBe(first);
        expect(await rememberedPort(folder, 'mail')).toBe(second);
      });
    });
  });
});

describe('choosePort', () => {
  describe('when PORT is given', () => {
    it('takes it if it is free, and says so in words if it is not', async () => {
      const port = await freePort();
      expect(await choosePort(String(port))).toBe(port);
      await whileTaken(port, async () => {
        expect(await isFree(port)).toBe(false);
        await expect(choosePort(String(port))).rejects.toThrow(`Port ${port} is taken`);
      });
    });

    it.each(['shop', '0', '70000', '80.5'])('refuses %s', async (asked) => {
      await expect(choosePort(asked)).rejects.toThrow(`PORT is "${asked}"`);
    });
  });
});
