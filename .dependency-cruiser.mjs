// The arrows of the house: errors <- science <- assessment <- features -> storage -> errors.
// Each comment says what to do instead.
const features = ['people', 'venues', 'plans', 'reviews', 'day', 'sheets'];

const laterNeighbours = features.flatMap((feature, index) => {
  const later = features.slice(index + 1);
  if (later.length === 0) return [];
  return [
    {
      name: `${feature}-looks-back-only`,
      comment: `${feature} comes before ${later.join(', ')}. Let the later room call this one, or pass the value in.`,
      severity: 'error',
      from: { path: `^src/${feature}/` },
      to: { path: `^src/(${later.join('|')})/` },
    },
  ];
});

/** @type {import('dependency-cruiser').IConfiguration} */
export default {
  forbidden: [
    {
      name: 'no-circles',
      comment: 'Two files need each other. Move what both need into a third file below them.',
      severity: 'error',
      from: {},
      to: { circular: true },
    },
    {
      name: 'errors-is-the-ground',
      comment: 'errors.ts imports nothing. Pass the words in from the caller.',
      severity: 'error',
      from: { path: '^src/errors\\.ts$' },
      to: { path: '.+' },
    },
    {
      name: 'science-is-pure',
      comment:
        'Science knows only science and errors. Pass data, time and wording in from the caller.',
      severity: 'error',
      from: { path: '^src/science/' },
      to: { path: '^src/', pathNot: '^src/(science/|errors\\.ts$)' },
    },
    {
      name: 'science-packages',
      comment:
        'Science runs in Node, workers and browsers alike: no node:* and no packages outside the short list in DEVELOPERS.md.',
      severity: 'error',
      from: { path: '^src/science/' },
      to: { dependencyTypes: ['core', 'npm', 'npm-dev', 'npm-no-pkg', 'npm-unknown'] },
    },
    {
      name: 'assessment-is-pure',
      comment:
        'Assessment takes venue, plan, catalogue and clock as values. Let the feature fetch them and pass them in.',
      severity: 'error',
      from: { path: '^src/assessment/' },
      to: { path: '^src/', pathNot: '^src/(science/|assessment/|errors\\.ts$)' },
    },
    {
      name: 'assessment-packages',
      comment:
        'Assessment runs in Node, workers and browsers alike. Only the schema packages and the canonical-JSON package are allowed.',
      severity: 'error',
      from: { path: '^src/assessment/' },
      to: {
        dependencyTypes: ['core', 'npm', 'npm-dev', 'npm-no-pkg', 'npm-unknown'],
        pathNot: 'node_modules/(typebox|ajv|ajv-formats|json-canonicalize|@noble/hashes)/',
      },
    },
    {
      name: 'catalogue-reads-templates-only',
      comment:
        'The catalogue turns data files into frozen values. What it needs from a feature is passed in.',
      severity: 'error',
      from: { path: '^src/catalogue/' },
      to: { path: '^src/', pathNot: '^src/(catalogue/|science/|assessment/|errors\\.ts$)' },
    },
    {
      name: 'storage-knows-rows-not-physics',
      comment: 'Storage maps rows. Map rows to values in the feature that asked.',
      severity: 'error',
      from: { path: '^src/storage/' },
      to: { path: '^src/', pathNot: '^src/(storage/|errors\\.ts$)' },
    },
    {
      name: 'only-storage-knows-the-database',
      comment: 'Ask a repository of src/storage instead of the database client.',
      severity: 'error',
      from: { path: '^src/', pathNot: '^src/storage/' },
      to: { path: '(node_modules/(@prisma|prisma|better-sqlite3)/|^src/storage/generated/)' },
    },
    {
      name: 'web-imports-no-feature',
      comment: 'View helpers serve every feature and know none. Pass the value in.',
      severity: 'error',
      from: { path: '^src/web/' },
      to: { path: `^src/(${features.join('|')})/` },
    },
    {
      name: 'only-one-file-prints',
      comment:
        'PDFKit stays behind one file. Describe the page in the document tree and let render-pdf draw it.',
      severity: 'error',
      from: { path: '^src/', pathNot: '^src/sheets/render-pdf' },
      to: { path: 'node_modules/(pdfkit|svg-to-pdfkit)/' },
    },
    {
      name: 'only-the-catalogue-reads-templates',
      comment:
        'Ask the catalogue for the value; only it, storage, sheets (fonts), start-up and the command line touch files.',
      severity: 'error',
      from: {
        path: '^src/',
        pathNot:
          '^src/(catalogue/|storage/|sheets/|web/|workers/|main\\.ts$|cli\\.ts$|config\\.ts$)',
      },
      to: { path: '^(node:)?fs(/promises)?$', dependencyTypes: ['core'] },
    },
    {
      name: 'nobody-imports-start-up',
      comment: 'main.ts, cli.ts and app.module.ts wire the rooms; nothing may depend on them.',
      severity: 'error',
      from: { path: '^src/', pathNot: '^src/(main|cli|app\\.module)\\.ts$' },
      to: { path: '^src/(main|cli|app\\.module)\\.ts$' },
    },
    ...laterNeighbours,
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^src/storage/generated/' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'node', 'types', 'default'],
    },
  },
};
