// Who may import whom. Each rule says what a folder may import; anything else in it is reported.
// `scripts/check-imports.mjs` runs this and makes sure that every source file was read.

const packages = (...names) => names.map((name) => `(^|/)node_modules/(@types/)?${name}/`)
const anyPackage = '(^|/)node_modules/'
const reactFlow = '(^|/)node_modules/(reactflow|@xyflow)/'
const next = '(^|/)node_modules/(next|next-auth)/'

/** A folder may import itself and what is listed; `core` says whether Node's own modules are allowed. */
function mayImport(name, from, allowed, { core = false, comment }) {
  const rules = [
    { name, severity: 'error', comment, from, to: { pathNot: allowed, dependencyTypesNot: ['core'] } },
  ]
  if (!core)
    rules.push({
      name: `${name}-no-node`,
      severity: 'error',
      comment,
      from,
      to: { dependencyTypes: ['core'] },
    })
  return rules
}

/** Inside diagrams/: each layer and those below it. */
const layers = {
  tables: [],
  document: ['tables'],
  commands: ['tables', 'document'],
  solver: ['tables', 'document'],
  faults: ['tables', 'document', 'solver'],
  planner: ['tables', 'document', 'solver', 'faults'],
  distance: ['tables', 'document', 'solver'],
  'fault-table': ['tables', 'document', 'solver'],
  drawing: ['tables', 'document'],
  samples: ['tables', 'document'],
}

const layerRules = Object.entries(layers).map(([layer, below]) => ({
  name: `diagrams-${layer}`,
  severity: 'error',
  comment: `diagrams/${layer} may import ${below.length > 0 ? below.join(', ') : 'no other layer'}.`,
  from: { path: `^diagrams/${layer}/` },
  to: { path: '^diagrams/', pathNot: `^diagrams/(${[layer, ...below].join('|')})/` },
}))

module.exports = {
  forbidden: [
    ...mayImport('diagrams', { path: '^diagrams/' }, ['^diagrams/', ...packages('zod')], {
      comment: 'diagrams/ is pure: zod and itself.',
    }),
    ...layerRules,
    {
      name: 'diagrams-layers-only',
      severity: 'error',
      comment: `A file of diagrams/ belongs to a layer (${Object.keys(layers).join(', ')}) or is a front door over all of them.`,
      from: {},
      to: { path: '^diagrams/', pathNot: `^diagrams/((${Object.keys(layers).join('|')})/|[^/]+$)` },
    },
    ...mayImport('db', { path: '^db/' }, ['^db/', '^diagrams/', ...packages('kysely', 'pg')], {
      core: true,
      comment: 'db/ may import diagrams/, kysely and pg.',
    }),
    ...mayImport('migrations', { path: '^migrations/' }, packages('kysely'), {
      comment: 'A migration is frozen: kysely only, so that later code cannot change what it did.',
    }),
    ...mayImport('lib-shared', { path: '^lib/shared/' }, ['^lib/shared/', '^diagrams/', ...packages('zod')], {
      comment: 'lib/shared runs anywhere: diagrams/ and zod.',
    }),
    ...mayImport(
      'lib-client',
      { path: '^lib/client/' },
      ['^lib/client/', '^lib/shared/', '^diagrams/', anyPackage],
      {
        comment: 'lib/client may import lib/shared and diagrams/; never components/.',
      },
    ),
    ...mayImport(
      'lib-server',
      { path: '^lib/server/' },
      ['^lib/server/', '^lib/shared/', '^db/', '^diagrams/', anyPackage],
      {
        core: true,
        comment: 'lib/server may import db/, lib/shared and diagrams/.',
      },
    ),
    {
      name: 'lib-client-no-next-server',
      severity: 'error',
      comment: 'lib/client talks to the server over HTTP only.',
      from: { path: '^lib/client/' },
      to: { path: '(^|/)node_modules/(next/(headers|server|cache)|pg|kysely)' },
    },
    {
      name: 'next-in-http-only',
      severity: 'error',
      comment: 'Inside lib/server, Next is known to lib/server/http alone: use cases know no HTTP.',
      from: { path: '^lib/server/', pathNot: '^lib/server/http/' },
      to: { path: next },
    },
    ...mayImport(
      'components',
      { path: '^components/' },
      ['^components/', '^lib/client/', '^lib/shared/', '^diagrams/', anyPackage],
      { comment: 'components/ may import lib/client, lib/shared and diagrams/.' },
    ),
    {
      name: 'react-flow-in-canvas-only',
      severity: 'error',
      comment: 'React Flow is known to components/canvas alone.',
      from: { path: '^(app|components|lib|db|diagrams)/', pathNot: '^components/canvas/' },
      to: { path: reactFlow },
    },
    ...mayImport(
      'app',
      { path: '^(app/|proxy\\.ts$)' },
      ['^app/', '^components/', '^lib/', '^diagrams/', anyPackage],
      { comment: 'app/ may import components/, lib/ and diagrams/; never db/.' },
    ),
    {
      name: 'sql-in-db-only',
      severity: 'error',
      comment: 'Queries live in db/ (and migrations/): nobody else builds one.',
      from: { path: '^(app|components|lib|diagrams)/' },
      to: { path: '(^|/)node_modules/(@types/)?(kysely|pg)/' },
    },
    {
      name: 'nobody-imports-tests',
      severity: 'error',
      comment: 'tests/ and scripts/ are the outermost rooms.',
      from: { pathNot: '^(tests|scripts)/' },
      to: { path: '^(tests|scripts)/' },
    },
    {
      name: 'scripts-import-no-tests',
      severity: 'error',
      comment: 'Nobody imports tests.',
      from: { path: '^scripts/' },
      to: { path: '^tests/' },
    },
    {
      name: 'no-cycles',
      severity: 'error',
      comment: 'No cycles anywhere.',
      from: {},
      to: { circular: true },
    },
    {
      name: 'resolvable',
      severity: 'error',
      comment: 'An import that leads nowhere escapes every other rule.',
      from: {},
      to: { couldNotResolve: true },
    },
  ],
  options: {
    tsConfig: { fileName: 'tsconfig.json' },
    // Imports of types count as well.
    tsPreCompilationDeps: true,
    preserveSymlinks: true,
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^|/)(\\.next|\\.data)/' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['types', 'import', 'require', 'node', 'default'],
    },
  },
}
