/** Imports point down, never sideways. DEVELOPERS.md draws the same layers. */
const only = (name, from, allowed, extra = {}) => ({
  name,
  severity: 'error',
  from: { path: from, ...extra },
  to: { pathNot: allowed },
});

module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    { name: 'nothing-unresolved', severity: 'error', from: {}, to: { couldNotResolve: true } },
    {
      name: 'code-never-imports-tests',
      severity: 'error',
      from: { pathNot: '^tests/' },
      to: { path: '^tests/' },
    },
    only('physics-sees-only-itself', '^shared/physics/', '^shared/physics/|^node_modules/(@types/)?ndarray'),
    only('apertures-see-physics', '^shared/apertures/', '^shared/(apertures|physics)/'),
    only('shared-sees-only-itself-and-zod', '^shared/', '^shared/|^node_modules/(zod|(@types/)?ndarray)'),
    only(
      'engine-sees-physics-and-apertures',
      '^server/engine/',
      '^server/engine/|^shared/(physics|apertures)/',
    ),
    {
      name: 'client-never-sees-server',
      severity: 'error',
      from: { path: '^src/' },
      to: { path: '^server/' },
    },
    {
      name: 'server-never-sees-client',
      severity: 'error',
      from: { path: '^server/' },
      to: { path: '^src/' },
    },
    {
      name: 'client-features-never-see-each-other',
      severity: 'error',
      from: { path: '^src/features/([^/]+)/' },
      to: { path: '^src/features/([^/]+)/', pathNot: '^src/features/$1/' },
    },
    only(
      'client-features-see-ui-lib-shared',
      '^src/features/',
      '^src/(features|ui|lib)/|^shared/|^node_modules/',
    ),
    only('ui-sees-lib', '^src/ui/', '^src/(ui|lib)/|^shared/|^node_modules/'),
    only('lib-sees-shared', '^src/lib/', '^src/lib/|^shared/|^node_modules/'),
    {
      name: 'server-features-meet-at-services',
      severity: 'error',
      from: { path: '^server/features/([^/]+)/' },
      to: { path: '^server/features/([^/]+)/', pathNot: '^server/features/($1/|[^/]+/service\\.ts$)' },
    },
    {
      name: 'lower-server-layers-never-see-features',
      severity: 'error',
      from: { path: '^server/(http|jobs|audit|storage|images|workers|engine)/' },
      to: { path: '^server/(features/|app\\.ts|main\\.ts)' },
    },
    {
      name: 'tables-only-in-stores',
      severity: 'error',
      from: {
        path: '^server/',
        pathNot: '/store\\.ts$|^server/db/|^server/jobs/queue\\.ts$|^server/audit/audit\\.ts$',
      },
      to: { path: '^server/db/schema/|^node_modules/drizzle-orm' },
    },
    {
      name: 'express-only-at-the-edge',
      severity: 'error',
      from: { path: '^server/', pathNot: '^server/(http/|app\\.ts|main\\.ts)|/routes\\.ts$' },
      to: { path: '^node_modules/(@types/)?express' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.base.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
      mainFields: ['module', 'main', 'types'],
    },
    exclude: { path: '\\.css$|^node:' },
  },
};
