// The order of the rooms: each may use those above it, never those below (DEVELOPERS.md).
const ROOMS = [
  'air',
  'profile',
  'site',
  'ingest',
  'quality',
  'jet',
  'rotor',
  'moisture',
  'storm',
  'outlook',
  'watch',
  'desk',
  'plot',
  'board',
  'relay',
];

const order = ROOMS.slice(0, -1).map((room, index) => ({
  name: `${room}-looks-only-up`,
  severity: 'error',
  comment: `${room} knows nothing of the rooms below it`,
  from: { path: `^src/${room}/` },
  to: { path: `^src/(${ROOMS.slice(index + 1).join('|')})/` },
}));

module.exports = {
  forbidden: [
    ...order,
    {
      name: 'relay-knows-no-board',
      severity: 'error',
      from: { path: '^src/relay/' },
      to: { path: '^src/(board|plot)/' },
    },
    {
      name: 'through-the-front-door',
      severity: 'error',
      comment: "Another room's index.ts is its only door",
      from: { path: '^src/([^/]+)/' },
      to: { path: '^src/([^/]+)/', pathNot: ['^src/$1/', '^src/[^/]+/index\\.ts$'] },
    },
    { name: 'no-circles', severity: 'error', from: {}, to: { circular: true } },
    {
      name: 'pure-rooms-know-no-host',
      severity: 'error',
      from: { path: `^src/(${ROOMS.slice(0, 13).join('|')})/` },
      to: { dependencyTypes: ['core'] },
    },
    { name: 'no-unresolved', severity: 'error', from: {}, to: { couldNotResolve: true } },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      conditionNames: ['import', 'svelte', 'browser', 'node', 'default'],
      exportsFields: ['exports'],
    },
  },
};
