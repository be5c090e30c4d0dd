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
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
    { name: 'nothing-unresolved', severity: 'error', from: {}, to: { couldNotResolve: true } },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      extensions: ['.ts', '.tsx', '.js'],
      conditionNames: ['import', 'types', 'node', 'default'],
      exportsFields: ['exports'],
    },
  },
};
