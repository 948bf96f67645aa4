import { createHmac, timingSafeEqual } from 'node:crypto';
import type { Signer } from '../ports.ts';

const tagBytes = 12;

/** Seals texts with HMAC-SHA-256 under the shop's secret; the tag is cut to 96 bits to keep links short. */
export function createSigner(secret: string): Signer {
  const tag = (purpose: string, text: string) =>
    createHmac('sha256', secret).update(`${purpose}\n${text}`).digest().subarray(0, tagBytes);
  return {
    seal(payload) {
      const body = Buffer.from(payload, 'utf8').toString('base64url');
      return `${body}.${tag('pack', body).toString('base64url')}`;
    },
    open(token) {
      const [body, mac, ...rest] = token.split('.');
      if (!body || !mac || rest.length > 0) return null;
      const given = Buffer.from(mac, 'base64url');
      const wanted = tag('pack', body);
      if (given.length !== wanted.length || !timingSafeEqual(given, wanted)) return null;
      return Buffer.from(body, 'base64url').toString('utf8');
    },
    orderToken(ref) {
      return createHmac('sha256', secret).update(`order\n${ref}`).digest('base64url').slice(0, 32);
    },
  };
}
