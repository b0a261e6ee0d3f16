/** Import directions: cli → blocks → core, and inside core downward only. Lowest layer first. */
const layers = [
  'quantity',
  'numeric',
  'equation',
  'block',
  'patch',
  'schedule',
  'engine',
  'trace',
  'analysis',
  'study',
];

const upward = layers.slice(0, -1).map((layer, index) => ({
  name: `core-${layer}-imports-upward`,
  severity: 'error',
  from: { path: `^packages/core/src/${layer}/` },
  to: { path: `^packages/core/src/(${layers.slice(index + 1).join('|')})/` },
}));

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    ...upward,
    {
      name: 'core-folder-unknown',
      comment: 'Every folder of core is a layer; a new one is given its place in the list above.',
      severity: 'error',
      from: { path: `^packages/core/src/(?!(${layers.join('|')})/)[^/]+/` },
      to: {},
    },
    {
      name: 'core-folder-imports-entry',
      comment: 'Entry files gather what the folders export; the folders know nothing of them.',
      severity: 'error',
      from: { path: '^packages/core/src/[^/]+/' },
      to: { path: '^packages/core/src/[^/]+$' },
    },
    {
      name: 'analysis-knows-blocks',
      comment: 'Measurements work on traces and numbers, whatever made them.',
      severity: 'error',
      from: { path: '^packages/core/src/analysis/' },
      to: { path: '^packages/core/src/(equation|block|patch|schedule|engine)/' },
    },
    {
      name: 'core-imports-other-package',
      severity: 'error',
      from: { path: '^packages/core/' },
      to: { path: '^packages/(?!core/)' },
    },
    {
      name: 'blocks-import-only-core-block',
      severity: 'error',
      from: { path: '^packages/blocks/' },
      to: { path: '^packages/(?!blocks/|core/src/block\\.ts$)' },
    },
    {
      name: 'block-imports-block',
      comment: 'What two kinds share stands in blocks/src/shared/.',
      severity: 'error',
      from: { path: '^packages/blocks/src/(?!index\\.ts$)' },
      to: { path: '^packages/blocks/src/(?!shared/)' },
    },
    {
      name: 'package-imports-outside',
      comment: 'Tests, examples, benchmarks and tools use the packages, never the reverse.',
      severity: 'error',
      from: { path: '^packages/' },
      to: { path: '^(test|examples|bench|tools)/' },
    },
    {
      name: 'node-import-outside-cli',
      comment: 'core and blocks run in a browser too.',
      severity: 'error',
      from: { path: '^packages/(core|blocks)/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'undeclared-package',
      comment: 'A package imports only what stands in its own dependencies.',
      severity: 'error',
      from: { path: '^packages/' },
      to: { path: '(^|/)node_modules/', dependencyTypesNot: ['npm'] },
    },
    { name: 'unresolvable', severity: 'error', from: {}, to: { couldNotResolve: true } },
    { name: 'circular', severity: 'error', from: {}, to: { circular: true } },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^|/)(dist|site|out|coverage)/' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['@tailpair/source', 'import', 'node', 'types', 'default'],
      extensions: ['.ts', '.mjs', '.js', '.cjs', '.d.ts', '.json'],
    },
  },
};
