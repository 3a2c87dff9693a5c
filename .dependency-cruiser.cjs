const { ARROWS, toPathPattern } = require('./lib/start/arrows.cjs')

const OURS = '^(app|components|db|jobs|lib|tests)/'
const escape = (text) => text.replace(/[.]/g, '\\.')
const anyOf = (paths) => `^(${paths.map(escape).join('|')})`
/** A package as it is written and as it is found below node_modules. */
const packagePattern = (name) =>
  name === 'node:' ? '^(node:|fs$|path$|child_process$|crypto$|os$)' : `(^|node_modules/)${name}(/|$)`.replace('//', '/')

/** The rules that one row of the table stands for. */
function rulesOf({ name, files, except, may, mayAsType = [], mayNot = [], packagesNot = [], packagesOnly }) {
  const from = { path: files.map(toPathPattern), ...(except.length > 0 ? { pathNot: except.map(toPathPattern) } : {}) }
  const rules = [
    { name: `${name}-arrow`, severity: 'error', from, to: { path: OURS, ...pathNot([...may, ...mayAsType]) } },
    { name: `${name}-no-package`, severity: 'error', from, to: { path: packagesNot.map(packagePattern) } },
  ]
  if (packagesNot.length === 0) rules.pop()
  if (mayAsType.length > 0) {
    const to = { path: anyOf(mayAsType), ...pathNot(may), dependencyTypesNot: ['type-only'] }
    rules.push({ name: `${name}-type-only`, severity: 'error', from, to })
  }
  if (mayNot.length > 0) rules.push({ name: `${name}-not`, severity: 'error', from, to: { path: anyOf(mayNot) } })
  if (packagesOnly) {
    const allowed = packagesOnly.map((packageName) => `(^|node_modules/)${packageName}/`)
    rules.push({ name: `${name}-pure`, severity: 'error', from, to: { pathNot: [OURS, ...allowed] } })
  }
  return rules
}

const pathNot = (paths) => (paths.length > 0 ? { pathNot: anyOf(paths) } : {})

module.exports = {
  forbidden: [
    ...ARROWS.flatMap(rulesOf),
    { name: 'no-cycle', severity: 'error', from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } } },
    { name: 'not-from-app', severity: 'error', from: { pathNot: '^(app|tests)/' }, to: { path: '^app/' } },
    { name: 'not-from-tests', severity: 'error', from: { pathNot: '^tests/' }, to: { path: '^tests/' } },
    { name: 'resolvable', severity: 'error', from: {}, to: { couldNotResolve: true } },
    {
      name: 'declared',
      severity: 'error',
      from: { pathNot: '^tests/' },
      to: { dependencyTypes: ['npm-dev', 'npm-no-pkg', 'npm-unknown'] },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^(\\.next|data|lib/start)' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { exportsFields: ['exports'], conditionNames: ['import', 'require', 'node', 'default', 'types'] },
  },
}
