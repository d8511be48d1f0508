import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';
import { frontHandler } from './src/entry/integration.mjs';

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'middleware' }),
  integrations: [react(), frontHandler()],
  devToolbar: { enabled: false },
  // The address is known only at run time: our own middleware checks Origin, for JSON as well (src/middleware.ts).
  security: { checkOrigin: false },
  experimental: {
    csp: {
      algorithm: 'SHA-256',
      directives: [
        "default-src 'self'",
        "object-src 'none'",
        "base-uri 'none'",
        "frame-ancestors 'none'",
        "form-action 'self'",
        "img-src 'self' data: blob:",
      ],
    },
  },
  vite: { plugins: [tailwindcss()] },
});
