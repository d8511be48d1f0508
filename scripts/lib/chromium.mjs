// @ts-check

/** Debian's Chromium, without anything that calls elsewhere. */
export async function launchChromium() {
  const { chromium } = await import('playwright-core');
  return chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: [
      ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
    ],
  });
}
