/**
 * Who may import whom: the rooms of DEVELOPERS.md as rules. What a room may import is listed; the rest is an error.
 * `.astro` files are not read by this tool; scripts/lib/astro-imports.mjs holds them to the same list.
 */
const { rooms } = require('./scripts/lib/rooms.cjs');

/** Tests stand beside what they test and may reach further, for data and for the other side. */
const TESTS = '\\.test\\.tsx?$|^src/engine/testing/';

const roomRules = Object.entries(rooms).map(([room, { path, may }]) => ({
  name: `room-${room}`,
  comment: `What ${path} may import: ${may.join(', ') || 'nothing but itself'}`,
  severity: 'error',
  from: { path: `^${path}`, pathNot: TESTS },
  to: {
    path: '^(src|samples|scripts|tests|bench|docker-free-fakes)/',
    pathNot: [path, ...may].map((one) => `^${one}`),
  },
}));

module.exports = {
  forbidden: [
    ...roomRules,
    {
      name: 'engine-is-pure',
      comment: 'The engine runs in worker, server and browser alike: no Node, no package but fft.js.',
      severity: 'error',
      from: { path: '^src/engine/', pathNot: TESTS },
      to: {
        dependencyTypes: ['core', 'npm', 'npm-dev', 'npm-optional', 'npm-peer', 'npm-no-pkg'],
        pathNot: 'node_modules/fft\\.js/',
      },
    },
    {
      name: 'engine-signal-is-lowest',
      comment: 'What holds for any samples knows nothing of circuits, files or comparisons.',
      severity: 'error',
      from: { path: '^src/engine/signal/', pathNot: TESTS },
      to: { path: '^src/engine/(reading|circuits|relations|comparison)/' },
    },
    {
      name: 'engine-reading-stands-alone',
      comment: 'Text becomes columns before anything is known about circuits.',
      severity: 'error',
      from: { path: '^src/engine/reading/', pathNot: TESTS },
      to: { path: '^src/engine/(circuits|relations|comparison)/' },
    },
    {
      name: 'engine-circuits-below-relations',
      comment: 'A circuit is measured by itself; only shapes of reading are known to it.',
      severity: 'error',
      from: { path: '^src/engine/circuits/', pathNot: TESTS },
      to: { path: '^src/engine/(relations|comparison|reading)/', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'engine-relations-below-comparison',
      severity: 'error',
      from: { path: '^src/engine/relations/', pathNot: TESTS },
      to: { path: '^src/engine/(comparison|reading)/', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'components-take-only-types-of-the-contract',
      comment: 'The schemas would bring zod to the browser.',
      severity: 'error',
      from: { path: '^src/components/', pathNot: TESTS },
      to: { path: '^src/contract/', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'components-without-node-and-schemas',
      comment: 'Components end up in the browser.',
      severity: 'error',
      from: { path: '^src/components/', pathNot: TESTS },
      to: {
        path: '(^|node_modules/)(zod|pg|drizzle-orm|@aws-sdk/[^/]+|node:[^/]+)(/|$)',
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'product-without-tools',
      comment: 'What is served needs nothing that is installed for development only.',
      severity: 'error',
      from: { path: '^src/', pathNot: TESTS },
      to: { dependencyTypes: ['npm-dev'], dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'no-circles',
      comment: 'Two files that need each other are one file, or three.',
      severity: 'error',
      from: { path: '^(src|scripts|samples|docker-free-fakes)/' },
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    {
      name: 'resolvable',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true, pathNot: '^(astro:|dist/)|server/entry\\.mjs$' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^(dist|\\.astro|\\.gapmark|\\.look)/' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'node', 'default', 'types'],
    },
  },
};
