import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { chromium, type BrowserContext } from 'playwright-core';

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

type ContextOptions = NonNullable<Parameters<typeof chromium.launchPersistentContext>[1]>;

export interface TestBrowser {
  context: BrowserContext;
  close(): Promise<void>;
}

/** Chromium on a fresh profile; `close` removes the profile. */
export async function openBrowser(options: ContextOptions = {}): Promise<TestBrowser> {
  const profile = mkdtempSync(path.join(tmpdir(), 'tockwell-browser-'));
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
    args: flags,
    locale: 'en-GB',
    timezoneId: 'UTC',
    viewport: { width: 1280, height: 900 },
    ...options,
  });
  context.setDefaultTimeout(20_000);
  const close = async () => {
    await context.close();
    rmSync(profile, { recursive: true, force: true });
  };
  return { context, close };
}
