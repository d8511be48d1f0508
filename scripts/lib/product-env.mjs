// @ts-check

/**
 * The environment of the product's processes: little of ours, so that what happens to be set at this terminal (another
 * database, a profile of some cloud) does not leak into a copy, and every GAPMARK_ setting.
 * @param {{ services: Record<string, string>, secret: string, dataDir: string, host: string, port: number, origin: string }} options
 * @returns {Record<string, string>}
 */
export function productEnv({ services, secret, dataDir, host, port, origin }) {
  const settings = Object.entries(process.env).flatMap(([name, value]) =>
    name.startsWith('GAPMARK_') && value !== undefined ? [/** @type {const} */ ([name, value])] : [],
  );
  return {
    PATH: process.env.PATH ?? '/usr/bin:/bin',
    HOME: process.env.HOME ?? '/',
    LANG: 'C.UTF-8',
    TZ: 'UTC',
    NODE_ENV: 'production',
    GAPMARK_ENV: 'local',
    GAPMARK_SECRET: secret,
    ...Object.fromEntries(settings),
    ...services,
    HOST: host,
    PORT: String(port),
    GAPMARK_ORIGIN: origin,
    GAPMARK_DATA: dataDir,
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ASTRO_TELEMETRY_DISABLED: '1',
  };
}
