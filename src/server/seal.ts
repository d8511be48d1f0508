import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';
import { config } from './config.ts';

/** What a sealed text is for. A text sealed for one purpose does not open for another. */
export type SealPurpose = 'mail' | 'second step' | 'webhook key';

const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** HKDF (RFC 5869) over the instance's secret, a key for each purpose. */
const keyFor = (purpose: SealPurpose): Buffer =>
  Buffer.from(hkdfSync('sha256', config().secret, 'gapmark seal 1', purpose, 32));

/**
 * Seals what the server itself must read again, so that a dump of the database does not hold it: AES-256-GCM with a fresh
 * nonce (NIST SP 800-38D), base64url of nonce, tag and text.
 */
export function seal(purpose: SealPurpose, text: string): string {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', keyFor(purpose), nonce);
  const sealed = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
}

/** Opens what `seal()` gave. @throws when it was changed, was sealed for something else, or the instance's secret is another. */
export function unseal(purpose: SealPurpose, sealed: string): string {
  const bytes = Buffer.from(sealed, 'base64url');
  const nonce = bytes.subarray(0, NONCE_BYTES);
  const decipher = createDecipheriv('aes-256-gcm', keyFor(purpose), nonce, { authTagLength: TAG_BYTES });
  decipher.setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
  return Buffer.concat([decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES)), decipher.final()]).toString(
    'utf8',
  );
}
