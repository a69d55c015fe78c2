/** Who may import whom: the layers that DEVELOPERS.md describes. */
const DOMAIN = '^lib/(?!engine/|study-file/|email/|auth/|audit/|jobs/|http/|db/)[^/]+/';

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    {
      name: 'no-circular',
      comment: 'A circle has no first room.',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    {
      name: 'not-resolvable',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true },
    },
    {
      name: 'engine-stands-alone',
      comment: 'The engine imports itself and @stdlib: no clock, no chance, no database of its own.',
      severity: 'error',
      from: { path: '^lib/engine/' },
      to: { pathNot: ['^lib/engine/', '(^|/)node_modules/@stdlib/'] },
    },
    {
      name: 'study-file-is-a-contract',
      comment: 'The public contract runs anywhere: zod, the engine’s types and plain facts only.',
      severity: 'error',
      from: { path: '^lib/study-file/' },
      to: { path: ['^app/', '^components/', '^entities/', '^lib/(auth|audit|jobs|http|db|email)/', DOMAIN] },
    },
    {
      name: 'entities-import-types-only',
      severity: 'error',
      from: { path: '^entities/' },
      to: { path: ['^app/', '^components/', '^lib/'], dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'domains-know-no-web',
      comment:
        'Queries, commands and rules serve routes, jobs and tests alike; hooks.ts is the client’s side. Of lib/http only the shapes of operations and of parameters are known.',
      severity: 'error',
      from: { path: DOMAIN, pathNot: '/(hooks|operations)\\.ts$' },
      to: {
        path: [
          '^lib/http/(?!(operation|params)\\.ts)',
          '(^|/)node_modules/(next|react|react-dom|@tanstack)/',
          '^app/',
          '^components/',
        ],
      },
    },
    {
      name: 'operations-are-declarations',
      severity: 'error',
      from: { path: '^lib/.+/operations\\.ts$' },
      to: {
        path: [
          '^app/',
          '^components/',
          '^entities/',
          '^lib/db/',
          '^lib/http/(?!(operation|params)\\.ts)',
          '/(commands|queries)\\.ts$',
        ],
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'commands-belong-to-routes',
      comment: 'A command is called by its route, by jobs and by the seed; pages and components go through HTTP.',
      severity: 'error',
      from: { path: ['^app/', '^components/'], pathNot: '/route\\.ts$' },
      to: { path: '^lib/.+/commands\\.ts$' },
    },
    {
      name: 'routes-hold-no-queries-of-their-own',
      severity: 'error',
      from: { path: '^app/' },
      to: { path: '^entities/' },
    },
    {
      name: 'components-stay-on-their-side',
      comment: 'A component may be sent to the browser: it knows schemas, operations, hooks and types, no server code.',
      severity: 'error',
      from: { path: '^components/' },
      to: {
        path: [
          '^app/',
          '^entities/',
          '^migrations/',
          '^lib/(db|jobs|audit/record|email/transport|storage|env|log)',
          '/(commands|queries)\\.ts$',
        ],
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'ui-fits-any-product',
      severity: 'error',
      from: { path: '^components/(ui|charts)/' },
      to: { path: ['^components/(?!ui/|charts/)', DOMAIN], dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'domains-only-enqueue',
      comment: 'The registry imports the domains’ jobs; the other way round there is only the enqueue file.',
      severity: 'error',
      from: { path: [DOMAIN, '^lib/(email|audit|auth)/'] },
      to: { path: '^lib/jobs/(registry|install)\\.ts$' },
    },
    {
      name: 'the-product-does-not-know-its-tests',
      severity: 'error',
      from: { pathNot: ['^tests/', '^(vitest|playwright)\\.config\\.ts$'] },
      to: { path: '^tests/' },
    },
    {
      name: 'no-rooms-without-a-name',
      comment: 'utils, helpers, service, manager and common say nothing about what is inside.',
      severity: 'error',
      from: {},
      to: {
        path: '/(util|utils|helper|helpers|service|services|manager|managers|common)(/|[.])',
        pathNot: 'node_modules',
      },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^(\\.next|\\.data|dist)/' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
