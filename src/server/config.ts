import { z } from 'zod';

const flag = (fallback: 'open' | 'invite') => z.enum(['open', 'invite']).default(fallback);

const schema = z.object({
  DATABASE_URL: z.string().url(),
  S3_ENDPOINT: z.string().url().optional(),
  S3_REGION: z.string().min(1).default('us-east-1'),
  S3_BUCKET: z.string().min(1).default('gapmark'),
  S3_ACCESS_KEY_ID: z.string().min(1),
  S3_SECRET_ACCESS_KEY: z.string().min(1),
  SMTP_URL: z.string().url().optional(),
  MAIL_FROM: z.string().min(3).default('Gapmark <gapmark@localhost>'),
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65_535).default(4321),
  GAPMARK_ORIGIN: z
    .string()
    .url()
    .refine((url) => new URL(url).origin === url, 'must be scheme, host and port only, without a path')
    .optional(),
  GAPMARK_ENV: z.enum(['local', 'production']).default('local'),
  GAPMARK_SIGNUP: flag('open'),
  /** Addresses of proxies whose forwarded headers are believed, comma separated. */
  GAPMARK_TRUSTED_PROXIES: z.string().default(''),
  GAPMARK_WEBHOOK_ALLOW: z.string().default(''),
  /** What is sealed in the database is sealed with it. */
  GAPMARK_SECRET: z.string().min(32, 'needs at least 32 characters').optional(),
  /** Most bytes of originals that a workshop may keep; none: as many as the store takes. */
  GAPMARK_WORKSHOP_LIMIT: z.coerce.number().int().positive().optional(),
  /** Largest upload in bytes. */
  GAPMARK_UPLOAD_LIMIT: z.coerce
    .number()
    .int()
    .positive()
    .default(2 * 1024 ** 3),
});

export interface Config {
  readonly databaseUrl: string;
  readonly store: {
    readonly endpoint: string | undefined;
    readonly region: string;
    readonly bucket: string;
    readonly accessKeyId: string;
    readonly secretAccessKey: string;
  };
  readonly mail: { readonly url: string | undefined; readonly from: string };
  readonly host: string;
  readonly port: number;
  /** The public address: scheme, host and port. */
  readonly origin: string;
  readonly production: boolean;
  readonly signUp: 'open' | 'invite';
  readonly trustedProxies: readonly string[];
  readonly webhookAllow: readonly string[];
  readonly uploadLimitBytes: number;
  /** Seals what the server must read again: see seal.ts. */
  readonly secret: string;
  readonly workshopLimitBytes: number | null;
}

const list = (text: string) =>
  text
    .split(',')
    .map((item) => item.trim())
    .filter(Boolean);

/** Reads and checks the environment. Throws one sentence for each bad setting, naming it; never its value. */
export function readConfig(environment: Record<string, string | undefined>): Config {
  const present = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const parsed = schema.safeParse(present);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`These settings need attention. ${faults.join('; ')}`);
  }
  const e = parsed.data;
  if (e.GAPMARK_ENV === 'production' && e.GAPMARK_WEBHOOK_ALLOW !== '')
    throw new Error('GAPMARK_WEBHOOK_ALLOW is for tests and is refused in production.');
  if (e.GAPMARK_ENV === 'production' && e.GAPMARK_ORIGIN === undefined)
    throw new Error('GAPMARK_ORIGIN must be set in production: links in mail use it.');
  if (e.GAPMARK_ENV === 'production' && e.GAPMARK_SECRET === undefined)
    throw new Error(
      'GAPMARK_SECRET must be set in production: it seals the keys of the second sign-in step.',
    );
  return {
    databaseUrl: e.DATABASE_URL,
    store: {
      endpoint: e.S3_ENDPOINT,
      region: e.S3_REGION,
      bucket: e.S3_BUCKET,
      accessKeyId: e.S3_ACCESS_KEY_ID,
      secretAccessKey: e.S3_SECRET_ACCESS_KEY,
    },
    mail: { url: e.SMTP_URL, from: e.MAIL_FROM },
    host: e.HOST,
    port: e.PORT,
    origin: e.GAPMARK_ORIGIN ?? `http://127.0.0.1:${e.PORT}`,
    production: e.GAPMARK_ENV === 'production',
    signUp: e.GAPMARK_SIGNUP,
    trustedProxies: list(e.GAPMARK_TRUSTED_PROXIES),
    webhookAllow: list(e.GAPMARK_WEBHOOK_ALLOW),
    uploadLimitBytes: e.GAPMARK_UPLOAD_LIMIT,
    // A copy on one's own machine has a secret already that no table holds.
    secret: e.GAPMARK_SECRET ?? e.S3_SECRET_ACCESS_KEY,
    workshopLimitBytes: e.GAPMARK_WORKSHOP_LIMIT ?? null,
  };
}

let current: Config | undefined;

/** The process's configuration, read once. */
export function config(): Config {
  current ??= readConfig(process.env);
  return current;
}
