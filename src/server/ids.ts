import { createHash, randomBytes } from 'node:crypto';

const ALPHABET = 'abcdefghijklmnopqrstuvwxyz234567';

/** An opaque id: 20 characters, 100 random bits. */
export function newId(): string {
  let id = '';
  for (const byte of randomBytes(20)) id += ALPHABET[byte & 31];
  return id;
}

/** A secret of 256 random bits in base64url. Only its hash is kept. */
export function newSecret(): string {
  return randomBytes(32).toString('base64url');
}

/** SHA-256 in hex: what the database keeps of a session, token, share, invitation or reset secret. */
export function hashSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}
