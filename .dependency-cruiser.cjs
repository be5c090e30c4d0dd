/** Who may import whom. Type-only imports count (tsPreCompilationDeps). */
module.exports = {
  forbidden: [
    {
      name: 'app-is-pure',
      comment: 'app imports app and zod only: no Node, DOM, Electron, main or renderer',
      severity: 'error',
      from: { path: '^app/' },
      to: { pathNot: '^(app/|node_modules/zod/)' },
    },
    { name: 'main-not-renderer', severity: 'error', from: { path: '^main/' }, to: { path: '^(renderer|test)/' } },
    { name: 'renderer-not-main', severity: 'error', from: { path: '^renderer/' }, to: { path: '^(main|test)/' } },
    {
      name: 'components-know-no-state',
      comment: 'renderer/components are told what to show; they neither call the host nor read the store',
      severity: 'error',
      from: { path: '^renderer/components/' },
      to: { path: '^renderer/(api|state|shell|commands)/' },
    },
    {
      name: 'state-knows-no-view',
      severity: 'error',
      from: { path: '^renderer/(api|state)/' },
      to: { path: '^renderer/(components|shell|commands)/' },
    },
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
    {
      name: 'nothing-unresolved',
      comment: "pdfmake/interfaces is a file of pdfmake's type package alone",
      severity: 'error',
      from: {},
      to: { couldNotResolve: true, pathNot: '^pdfmake/interfaces' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      extensions: ['.ts', '.tsx', '.js', '.css', '.ttf'],
      conditionNames: ['import', 'types', 'node', 'default'],
      exportsFields: ['exports'],
    },
  },
};
