// The direction of imports, as `npm test` holds it. Every rule names why it is there.
const CORE = 'mechanism|comparison|diagnosis|planning|statistics|interchange';
const tests = '\\.test\\.tsx?$';

/** A core folder may import only itself and the folders below it. */
const layer = (name, allowed) => ({
  name: `${name}-looks-down-only`,
  comment: 'mechanism ← comparison ← diagnosis ← planning; what is below knows nothing of what is above.',
  severity: 'error',
  from: { path: `^src/lib/${name}/`, pathNot: tests },
  to: { path: '^src/', pathNot: `^src/lib/(${[name, ...allowed].join('|')})/` },
});

module.exports = {
  forbidden: [
    layer('mechanism', []),
    layer('comparison', ['mechanism']),
    layer('diagnosis', ['comparison', 'mechanism']),
    layer('planning', ['diagnosis', 'comparison', 'mechanism']),
    layer('statistics', ['mechanism']),
    layer('interchange', ['comparison', 'mechanism']),
    {
      name: 'core-is-pure',
      comment:
        'The core runs in the page, a worker and the server alike: no packages, no Node. The CSV reader is the one exception.',
      severity: 'error',
      from: { path: `^src/lib/(${CORE})/`, pathNot: tests },
      to: {
        dependencyTypes: ['npm', 'npm-dev', 'npm-peer', 'core'],
        pathNot: 'node_modules/(papaparse|@types/papaparse)/',
      },
    },
    {
      name: 'papaparse-in-interchange-only',
      severity: 'error',
      from: { path: '^src/', pathNot: '^src/lib/interchange/' },
      to: { path: 'node_modules/papaparse/' },
    },
    {
      name: 'schemas-know-the-core-only',
      severity: 'error',
      from: { path: '^src/lib/schemas/', pathNot: tests },
      to: { path: '^src/', pathNot: `^src/lib/(schemas|${CORE})/|^src/lib/(policy|paths|format)\\.ts$` },
    },
    {
      name: 'server-stays-on-the-server',
      comment: 'Nothing that a page sends to the browser may reach the server, not even over three files.',
      severity: 'error',
      from: { path: '^src/(components/.*\\.tsx?|lib/client/)', pathNot: tests },
      to: { path: '^src/lib/server/', reachable: true },
    },
    {
      name: 'server-knows-no-pages',
      severity: 'error',
      from: { path: '^src/lib/' },
      to: { path: '^src/(components|layouts|pages|cli)/|^src/middleware' },
    },
    { name: 'nobody-imports-a-page', severity: 'error', from: {}, to: { path: '^src/pages/' } },
    {
      name: 'nobody-imports-a-command',
      severity: 'error',
      from: { path: '^src/', pathNot: '^src/cli/' },
      to: { path: '^src/cli/' },
    },
    {
      name: 'no-circles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      extensions: ['.ts', '.tsx', '.mjs', '.js'],
      conditionNames: ['import', 'require', 'node', 'default'],
    },
  },
};
