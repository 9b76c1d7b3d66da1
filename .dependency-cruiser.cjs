/** Arrows run one way: src → shared ← server; see DEVELOPERS.md. @type {import('dependency-cruiser').IConfiguration} */
const featuresOf = (room) =>
  `^${room}/(today|accounts|patients|referrals|prescriptions|plans|schedule|floor|billing|messages|reports|settings|audit)/`;

module.exports = {
  forbidden: [
    {
      name: 'no-circular',
      severity: 'error',
      from: {},
      to: { circular: true, dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'shared-is-alone',
      severity: 'error',
      from: { path: '^shared/', pathNot: '\\.spec\\.ts$' },
      to: { path: '^(src|server|emails|scripts|test)/' },
    },
    {
      name: 'client-knows-no-server',
      severity: 'error',
      from: { path: '^src/' },
      to: { path: '^(server|emails|scripts|migrations)/' },
    },
    {
      name: 'server-knows-no-client',
      severity: 'error',
      from: { path: '^(server|emails)/' },
      to: { path: '^src/' },
    },
    {
      name: 'fakes-stand-apart',
      severity: 'error',
      from: { path: '^server/', pathNot: '^server/fakes/' },
      to: { path: '^server/fakes/' },
    },
    {
      name: 'units-know-nothing',
      severity: 'error',
      from: { path: '^shared/units/' },
      to: { path: '^shared/(contracts|clinical|scheduling|statistics)/' },
    },
    {
      name: 'clinical-on-units',
      severity: 'error',
      from: { path: '^shared/(clinical|scheduling|statistics)/' },
      to: { path: '^shared/contracts/' },
    },
    {
      name: 'client-features-stand-apart',
      severity: 'error',
      from: { path: '^src/app/([^/]+)/', pathNot: '^src/app/(core|ui)/' },
      to: { path: '^src/app/([^/]+)/', pathNot: ['^src/app/(core|ui)/', '^src/app/$1/'] },
    },
    {
      name: 'ui-knows-no-feature',
      severity: 'error',
      from: { path: '^src/app/(core|ui)/' },
      to: { path: featuresOf('src/app') },
    },
    {
      name: 'server-features-by-their-doors',
      severity: 'error',
      comment:
        'A feature reads another through its -queries.ts, writes through its -service.ts or -policy.ts inside its own transaction, and hears of it by its -events.ts.',
      from: {
        path: '^server/([^/]+)/',
        pathNot: [
          '^server/(http|database|jobs|mail|payments)/',
          '^server/demo/main\\.ts$',
          '\\.spec\\.ts$',
        ],
      },
      to: {
        path: featuresOf('server'),
        // Who calls is known to every feature.
        pathNot: [
          '^server/$1/',
          '^server/accounts/actor\\.ts$',
          '-(queries|service|policy|events)\\.ts$',
        ],
      },
    },
  ],
  options: {
    tsConfig: { fileName: 'server/tsconfig.json' },
    tsPreCompilationDeps: true,
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '\\.(spec)\\.ts$' },
  },
};
