/**
 * Import directions of the house. A part may import only the parts listed for it (and itself).
 * The pure parts may not use Node built-ins, React, Prisma or anything of the server.
 */
const MAY_IMPORT = {
  numeric: [],
  dynamics: ['numeric'],
  series: [],
  estimate: ['numeric', 'dynamics', 'series'],
  forecast: ['numeric', 'dynamics', 'series', 'estimate'],
  scenario: ['numeric', 'dynamics', 'series', 'estimate', 'forecast'],
  brief: ['numeric', 'dynamics', 'series', 'estimate', 'forecast', 'scenario'],
  issue: ['numeric', 'dynamics', 'series', 'estimate', 'forecast', 'scenario', 'brief'],
  store: ['numeric', 'dynamics', 'series', 'estimate', 'forecast', 'scenario', 'brief', 'issue'],
  jobs: ['series', 'estimate', 'forecast', 'issue', 'store'],
  services: [
    'numeric',
    'dynamics',
    'series',
    'estimate',
    'forecast',
    'scenario',
    'brief',
    'issue',
    'store',
    'jobs',
  ],
  cli: [
    'numeric',
    'dynamics',
    'series',
    'estimate',
    'forecast',
    'scenario',
    'brief',
    'issue',
    'store',
    'jobs',
    'services',
  ],
};
const PURE = ['numeric', 'dynamics', 'series', 'estimate', 'forecast', 'scenario', 'brief', 'issue'];
const LIBRARIES_OF_PURE_PARTS = [
  'pure-rand',
  'ml-levenberg-marquardt',
  'ml-matrix',
  'zod',
  'papaparse',
  'read-excel-file',
  'fflate',
];

const directions = Object.entries(MAY_IMPORT).map(([part, allowed]) => ({
  name: `direction-${part}`,
  comment: `lib/${part} may import only: ${allowed.join(', ') || 'nothing of the house'}`,
  severity: 'error',
  from: { path: `^lib/${part}/` },
  to: { path: '^(lib|app|seed|test)/', pathNot: `^lib/(${[part, ...allowed].join('|')})/` },
}));

module.exports = {
  forbidden: [
    ...directions,
    {
      name: 'pure-no-node',
      comment: 'The engine runs in Node and in the browser: no Node built-ins in the pure parts',
      severity: 'error',
      from: { path: `^lib/(${PURE.join('|')})/` },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'pure-few-libraries',
      comment: `Pure parts use only ${LIBRARIES_OF_PURE_PARTS.join(', ')}`,
      severity: 'error',
      from: { path: `^lib/(${PURE.join('|')})/` },
      to: { path: 'node_modules/', pathNot: `node_modules/(${LIBRARIES_OF_PURE_PARTS.join('|')})/` },
    },
    {
      name: 'prisma-only-in-store',
      comment: 'lib/store is the only importer of Prisma',
      severity: 'error',
      from: { path: '^(app|lib|seed)/', pathNot: '^lib/store/' },
      to: { path: '(node_modules/@?prisma/|^prisma/generated)' },
    },
    {
      name: 'pages-through-services',
      comment: 'Pages reach the database and the queue only through lib/services',
      severity: 'error',
      from: { path: '^app/' },
      to: { path: '^lib/(store|jobs|cli)/' },
    },
    { name: 'no-cycles', severity: 'error', from: { path: '^(lib|app)/' }, to: { circular: true } },
    {
      name: 'resolvable',
      severity: 'error',
      from: { path: '^(lib|app|seed|prisma)/' },
      to: { couldNotResolve: true, pathNot: '\\.css$' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^(prisma/generated|\\.next)' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
