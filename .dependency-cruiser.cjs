/** The import directions of DEVELOPERS.md, as rules. Each name says what is forbidden. */
const LEAVES = '^lib/(errors|log|clock|origin|turns)\\.ts$|^lib/config/';

/** `folder` may import itself, packages, and what `allowed` names. */
const only = (name, folder, allowed, comment) => ({
  name,
  severity: 'error',
  comment,
  from: { path: folder },
  to: { path: '^(app|components|lib|db|broker|devices|scripts|tests)/', pathNot: [folder, ...allowed].join('|') },
});

module.exports = {
  forbidden: [
    { name: 'no-cycles', severity: 'error', comment: 'Two files that import each other are one thing or need a third.', from: {}, to: { circular: true } },
    only('core-is-alone', '^lib/core/', [], 'lib/core imports nothing of the project but itself.'),
    { name: 'core-has-no-io', severity: 'error', comment: 'lib/core is pure: no Node modules.', from: { path: '^lib/core/' }, to: { dependencyTypes: ['core'] } },
    only('contracts', '^lib/contracts/', ['^lib/core/', '^lib/texts/languages\\.ts$']),
    only('texts', '^lib/texts/', ['^lib/core/'], 'What the house says to people knows no template and no database.'),
    only('leaves', '^lib/(errors|log|clock|origin|turns)\\.ts$|^lib/config/', [LEAVES]),
    only('policies', '^lib/auth/policies\\.ts$', ['^lib/core/']),
    only('db', '^db/(?!seed/)', ['^lib/core/', LEAVES]),
    only('seed', '^db/seed/', ['^lib/(core|contracts)/', LEAVES], 'What the demo says is written in the words of the requests that bring it in.'),
    only('transports', '^lib/(mail|push|storage)/', ['^lib/(core|texts)/', LEAVES]),
    {
      ...only('services', '^lib/services/', ['^lib/(core|contracts|texts|mail|push|storage)/', LEAVES, '^lib/auth/', '^db/'], 'Services know core, contracts, auth, db and transports; no HTTP, no framework.'),
    },
    { name: 'services-without-session', severity: 'error', comment: 'A service is told who acts; the session belongs to the web.', from: { path: '^lib/services/' }, to: { path: '^lib/auth/session' } },
    only('http', '^lib/http/', ['^lib/(auth|contracts|services|core)/', LEAVES]),
    only('client', '^lib/client/', ['^lib/(contracts|core)/']),
    only('components', '^components/', ['^lib/(client|contracts|core)/', '^lib/texts/languages\\.ts$']),
    { name: 'browser-has-no-database', severity: 'error', comment: 'No chain of imports may carry the database into the browser.', from: { path: '^(components|lib/client)/' }, to: { path: '^(db|broker|lib/(services|http|mail|config))/', reachable: true } },
    only('api', '^app/api/', ['^lib/(http|contracts|services|auth|core)/', LEAVES], 'A route is wrapper + contract + one service call.'),
    only('pages', '^app/(?!api/)', ['^app/', '^components/', '^lib/(services|auth|contracts|core|client|http)/', LEAVES]),
    only('broker', '^broker/', ['^lib/(contracts|services|core)/', '^lib/auth/sensors', LEAVES, '^db/']),
    only('simulator', '^devices/', ['^lib/(contracts|core)/', LEAVES]),
    only('assess-proves-the-core-pure', '^scripts/assess\\.ts$', ['^lib/(core|contracts)/'], 'scripts/assess.ts runs the analysis with no server and no database.'),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^\\.next' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { exportsFields: ['exports'], conditionNames: ['import', 'require', 'node', 'default', 'types'] },
  },
};
