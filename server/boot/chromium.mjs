import { existsSync } from 'node:fs';
import { installDebianPackage } from './debian-package.mjs';

const usualPlaces = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** The browser of the end-to-end tests and screenshots, installed when there is none. */
export async function ensureChromium(env = process.env) {
  if (env.CHROMIUM_PATH && existsSync(env.CHROMIUM_PATH)) return env.CHROMIUM_PATH;
  const found = usualPlaces.find((place) => existsSync(place));
  if (found) return found;
  await installDebianPackage('chromium', 'Chromium');
  return usualPlaces[0];
}
