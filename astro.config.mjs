import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';
import { frontHandler } from './src/entry/integration.mjs';

/**
 * Many small files cost more in headers than in bytes on a phone: what every island needs is one file, the plot another.
 * @param {string} id
 */
function manualChunks(id) {
  if (/node_modules\/(react|react-dom|scheduler)\//.test(id)) return 'react';
  if (
    /preload-helper|components\/(base\/(api|circuits|LineSample|numbers|Mark|Message|Verdict)|plot\/fetch-window)|engine\/drawing\/decode-window\.tsx?$/.test(
      id,
    )
  )
    return 'base';
  if (
    /node_modules\/uplot\/|(engine\/drawing|components\/plot)\/(?!Keys|SpanFigures|snap|OverlayPlot|overlay-canvas|plain-degree)|components\/capture\/(steps-of|usePlotModel|view-of|where-of|number-rows|number-text|labels)\./.test(
      id,
    )
  )
    return 'plot';
  return undefined;
}

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
  vite: { plugins: [tailwindcss()], build: { rollupOptions: { output: { manualChunks } } } },
});
