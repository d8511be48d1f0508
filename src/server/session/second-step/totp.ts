import { Secret, TOTP } from 'otpauth';

/** The one kind that every authenticator knows: SHA-1, six digits, thirty seconds (RFC 6238, section 1.2 and 5.3). */
const PERIOD_S = 30;
const DIGITS = 6;
/** One step before and after, for clocks that differ (RFC 6238, section 5.2). */
const WINDOW = 1;
/** RFC 4226, section 4: at least 128 bits, 160 recommended. */
const KEY_BYTES = 20;

export interface TotpSettings {
  readonly algorithm?: 'SHA1' | 'SHA256' | 'SHA512';
  readonly digits?: number;
}

const made = (key: Secret, { algorithm = 'SHA1', digits = DIGITS }: TotpSettings = {}) =>
  new TOTP({ issuer: 'Gapmark', label: 'Gapmark', secret: key, algorithm, digits, period: PERIOD_S });

/** A new key in base32, as authenticators take it. */
export const newTotpKey = (): string => new Secret({ size: KEY_BYTES }).base32;

/** The code at a moment (milliseconds since 1970). */
export const totpCode = (key: string, atMs: number, settings?: TotpSettings): string =>
  made(Secret.fromBase32(key), settings).generate({ timestamp: atMs });

/** The time step (30 s since 1970) of which this is the code, within one step of `atMs`; null when it is none. */
export function stepOfCode(key: string, code: string, atMs: number): number | null {
  if (!/^\d{6}$/.test(code)) return null;
  const delta = made(Secret.fromBase32(key)).validate({ token: code, timestamp: atMs, window: WINDOW });
  return delta === null ? null : Math.floor(atMs / 1000 / PERIOD_S) + delta;
}

/** The address that hands the key to an authenticator on the same device. */
export const totpAddress = (key: string, email: string): string =>
  new TOTP({
    issuer: 'Gapmark',
    label: email,
    secret: Secret.fromBase32(key),
    digits: DIGITS,
    period: PERIOD_S,
  }).toString();
