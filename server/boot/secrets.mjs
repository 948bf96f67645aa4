import { randomBytes } from 'node:crypto';
import path from 'node:path';
import { readJson, writeJson } from './project.mjs';

const random = (bytes) => randomBytes(bytes).toString('hex');

const makers = {
  databasePassword: () => random(24),
  sessionSecret: () => random(32),
  tokenSecret: () => random(32),
  stripeSecretKey: () => `sk_test_local_${random(12)}`,
  stripeWebhookSecret: () => `whsec_local_${random(16)}`,
};

/** This shop's secrets, made once and kept where only its user can read them. */
export function keptSecrets(dataDir) {
  const file = path.join(dataDir, 'secrets.json');
  const kept = readJson(file) ?? {};
  const missing = Object.keys(makers).filter((name) => !kept[name]);
  for (const name of missing) kept[name] = makers[name]();
  if (missing.length > 0) writeJson(file, kept, 0o600);
  return kept;
}
