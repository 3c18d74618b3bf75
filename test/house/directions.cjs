// The directions in which files may know each other; run by `npm test`.
/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  options: {
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '\\.build' },
  },
  forbidden: [
    {
      name: 'core-is-pure',
      comment: 'core knows itself and libraries that touch neither clock, disk nor network',
      severity: 'error',
      from: { path: '^core' },
      to: { pathNot: '^core|node_modules/(jstat|valibot|@valibot|yaml|temporal-polyfill|temporal-spec|temporal-utils)' },
    },
    {
      name: 'jstat-in-numerics-only',
      severity: 'error',
      from: { pathNot: '^(core/numerics/|test/)' },
      to: { path: 'node_modules/jstat' },
    },
    { name: 'client-not-server', severity: 'error', from: { path: '^client' }, to: { path: '^server' } },
    { name: 'server-not-client', severity: 'error', from: { path: '^server' }, to: { path: '^client' } },
    { name: 'nothing-on-test', severity: 'error', from: { pathNot: '^test' }, to: { path: '^test' } },
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
  ],
};
