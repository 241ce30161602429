// Who may import whom: the table in DEVELOPERS.md, enforced.
const only = (name, from, allowed, more = {}) => ({
  name,
  severity: 'error',
  from: { path: from, ...more },
  to: { path: '^(app|components|db|fake-services|lib|tests)/', pathNot: allowed },
});

module.exports = {
  forbidden: [
    {
      name: 'no-circles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    only('domain-is-pure', '^lib/domain/', '^lib/domain/'),
    {
      name: 'domain-imports-no-package',
      severity: 'error',
      from: { path: '^lib/domain/' },
      to: { dependencyTypes: ['npm', 'npm-dev', 'core'], pathNot: 'node_modules/(date-fns|@date-fns/tz)/' },
    },
    only(
      'schemas-and-forms',
      '^lib/(schemas|forms)/|^lib/errors\\.ts$',
      '^lib/(domain|schemas|forms)/|^lib/errors\\.ts$',
    ),
    only(
      'components-take-props',
      '^components/',
      '^components/|^lib/(domain|schemas|forms)/|^lib/errors\\.ts$',
    ),
    {
      name: 'components-never-reach-the-server',
      severity: 'error',
      from: { path: '^components/' },
      to: { reachable: true, path: '^(db|lib/(services|auth|adapters|http|jobs))/' },
    },
    only('db', '^db/', '^db/|^lib/(domain|schemas|config)/|^lib/errors\\.ts$'),
    only(
      'services',
      '^lib/services/',
      '^lib/(domain|schemas|services|adapters|config)/|^lib/errors\\.ts$|^db/(repositories/|read-models/|client\\.ts|tables\\.ts)',
    ),
    only('adapters', '^lib/adapters/', '^lib/(adapters|config|domain)/|^lib/errors\\.ts$'),
    only(
      'auth-and-http',
      '^lib/(auth|http)/',
      '^lib/(auth|http|domain|forms|schemas|services|adapters|config)/|^lib/errors\\.ts$|^db/client\\.ts$',
    ),
    only(
      'app',
      '^app/',
      '^app/|^components/|^lib/(domain|schemas|forms|services|auth|http|config|adapters)/|^lib/errors\\.ts$|^db/(read-models/|(client|listener)\\.ts)',
    ),
    {
      name: 'services-know-no-web',
      severity: 'error',
      from: { path: '^lib/(services|adapters)/|^db/' },
      to: { path: 'node_modules/(next|react|react-dom|next-auth)/' },
    },
    {
      name: 'knex-stays-in-db',
      severity: 'error',
      from: { path: '^(app|components|lib/(domain|schemas|services|auth|http))/' },
      to: { path: 'node_modules/(knex|pg)/' },
    },
    {
      name: 'nothing-imports-tests',
      severity: 'error',
      from: { pathNot: '^(tests|fake-services)/' },
      to: { path: '^(tests|fake-services)/' },
    },
    { name: 'no-unknown-imports', severity: 'error', from: {}, to: { couldNotResolve: true } },
  ],
  options: {
    exclude: { path: '(^|/)[.]next/' },
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
