const { readdirSync } = require('node:fs')

// The arrows of docs/decisions/0002: data walks one way. Features are read from the directory listing.
const features = (side) => readdirSync(`${__dirname}/${side}/features`, { withFileTypes: true }).filter((e) => e.isDirectory()).map((e) => e.name)

const forbid = (name, from, to, comment) => ({ name, severity: 'error', comment, from: { path: from }, to: { path: to, ...(name === 'no-ring' ? { circular: true } : {}) } })

const serverFeatureWalls = features('server').map((feature) => ({
  name: `server-feature-${feature}-through-index`,
  severity: 'error',
  comment: `Other features use ${feature} through its index.ts`,
  from: { path: '^server/features/', pathNot: `^server/features/${feature}/` },
  to: { path: `^server/features/${feature}/`, pathNot: `^server/features/${feature}/index\\.ts$` },
}))
const clientFeatureWalls = features('src').map((feature) => ({
  name: `client-feature-${feature}-alone`,
  severity: 'error',
  comment: 'Features of the client do not import each other; pages compose them',
  from: { path: `^src/features/${feature}/` },
  to: { path: '^src/features/', pathNot: `^src/features/${feature}/` },
}))

module.exports = {
  forbidden: [
    { name: 'no-ring', severity: 'error', comment: 'No import ring', from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } } },
    forbid('contract-is-alone', '^server/contract/', '^(server/(?!contract/)|src/|storage-fake/|tests/)', 'The contract imports zod alone'),
    forbid('pure-parts', '^server/(physics|ingest|ledger-format|document)/', '^(server/(?!(contract|physics|ingest|ledger-format|document)/)|src/|storage-fake/|tests/)', 'Pure parts know the contract alone'),
    forbid('physics-and-records-apart', '^server/physics/', '^server/(ingest|ledger-format|document)/', 'Pure parts do not lean on each other'),
    forbid('ingest-apart', '^server/ingest/', '^server/(physics|ledger-format|document)/', 'Pure parts do not lean on each other'),
    forbid('ledger-format-apart', '^server/ledger-format/', '^server/(physics|ingest|document)/', 'Pure parts do not lean on each other'),
    forbid('platform-below-features', '^server/platform/', '^(server/(features|physics|ingest|ledger-format|document|demo|fakes)/|src/|storage-fake/)', 'The platform knows no feature'),
    forbid('features-below-demo', '^server/features/', '^(server/(demo|fakes)/|src/|storage-fake/)', 'Features know neither demo nor fakes'),
    forbid('storage-fake-alone', '^storage-fake/', '^(server|src)/', 'The fake store imports nothing of ours'),
    forbid('client-takes-contract', '^src/(?!features/(signatures|ledger|entries)/|editor/|app/sheet/)', '^server/(?!contract/)', 'The client knows the contract alone'),
    forbid('signing-takes-ledger-format', '^src/features/(signatures|ledger)/', '^server/(?!contract/|ledger-format/)', 'Signing and checking use contract and ledger format'),
    forbid('editor-takes-document', '^src/(editor|features/entries|app/sheet)/', '^server/(?!contract/|document/)', 'The editor shares the form of the text'),
    forbid('client-downwards', '^src/(editor|plots|ui|lib)/', '^src/(features|app)/', 'Parts do not know features or pages'),
    forbid('features-below-app', '^src/features/', '^src/app/', 'Features do not know pages'),
    forbid('ui-knows-no-domain', '^src/(ui|plots)/', '^src/(lib|editor)/', 'ui and plots are given data'),
    ...serverFeatureWalls,
    ...clientFeatureWalls,
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { extensions: ['.ts', '.tsx', '.js', '.mjs'] },
  },
}
