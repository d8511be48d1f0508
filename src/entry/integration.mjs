/**
 * Mounts the front handler in `astro dev`, so that windows, uploads and headers are there as in production.
 * @returns {import('astro').AstroIntegration}
 */
export function frontHandler() {
  return {
    name: 'gapmark-front-handler',
    hooks: {
      'astro:server:setup': ({ server }) => {
        server.middlewares.use((request, response, next) => {
          // Loaded through Vite, so that a change to its sources counts at the next request.
          server.ssrLoadModule('/src/entry/handle.ts').then(
            ({ handle }) => handle(request, response, () => next()),
            (error) => next(error),
          );
        });
      },
    },
  };
}
