// @ts-check

/**
 * The rooms of the source and what each may import beside itself. The one list for both checkers of imports.
 * @type {Record<string, { path: string, may: string[] }>}
 */
const rooms = {
  engine: { path: 'src/engine/', may: [] },
  contract: { path: 'src/contract/', may: ['src/engine/'] },
  server: { path: 'src/server/', may: ['src/engine/', 'src/contract/', 'samples/'] },
  worker: { path: 'src/worker/', may: ['src/server/', 'src/engine/'] },
  entry: { path: 'src/entry/', may: ['src/server/', 'src/contract/'] },
  pages: {
    path: 'src/pages/',
    may: ['src/(server|contract|engine|components|layouts|styles|actions)/', 'src/middleware\\.ts'],
  },
  actions: { path: 'src/actions/', may: ['src/server/', 'src/contract/'] },
  components: {
    path: 'src/components/',
    may: ['src/engine/', 'src/contract/', 'src/actions/browser', 'src/styles/'],
  },
  layouts: { path: 'src/layouts/', may: ['src/components/', 'src/styles/'] },
  middleware: { path: 'src/middleware\\.ts', may: ['src/server/', 'src/contract/'] },
  samples: { path: 'samples/', may: ['src/engine/'] },
};

module.exports = { rooms };
