// Our own lint rules. They hold what the compiler cannot: every verb goes through the door, every change leaves its audit row,
// and no transaction waits for anything.
import { ESLintUtils } from '@typescript-eslint/utils'

const EXEMPTION = /^\s*no-door:\s*(\S.{9,})$/
const CTX_TYPES = new Set(['Ctx', 'PersonCtx', 'JobCtx', 'SystemCtx'])
const SKIPPED_KEYS = new Set(['parent', 'loc', 'range'])

/** Visits a node and everything inside it. */
function walk(node, visit) {
  visit(node)
  for (const [key, value] of Object.entries(node)) {
    if (SKIPPED_KEYS.has(key)) continue
    for (const child of Array.isArray(value) ? value : [value]) {
      if (child !== null && typeof child === 'object' && typeof child.type === 'string') walk(child, visit)
    }
  }
}

/** The name that is called: `once` of once(…), `.transaction` of db.transaction(…). */
function calledName(call) {
  if (call.callee.type === 'Identifier') return call.callee.name
  if (call.callee.type === 'MemberExpression' && call.callee.property.type === 'Identifier')
    return `.${call.callee.property.name}`
  return ''
}

/** Functions at the top of the file, by name. */
function topLevelFunctions(program) {
  const found = new Map()
  for (const statement of program.body) {
    const declaration = statement.type === 'ExportNamedDeclaration' ? statement.declaration : statement
    if (declaration?.type === 'FunctionDeclaration' && declaration.id) found.set(declaration.id.name, declaration)
    if (declaration?.type !== 'VariableDeclaration') continue
    for (const { id, init } of declaration.declarations) {
      if (id.type === 'Identifier' && /Function/.test(init?.type ?? '')) found.set(id.name, init)
    }
  }
  return found
}

/** Exported functions with the statement that exports them. */
function exportedFunctions(program, functions) {
  const exported = []
  for (const statement of program.body) {
    if (statement.type !== 'ExportNamedDeclaration' || statement.source) continue
    const names = statement.specifiers.map((specifier) => specifier.local.name)
    if (statement.declaration?.type === 'FunctionDeclaration') names.push(statement.declaration.id.name)
    if (statement.declaration?.type === 'VariableDeclaration') {
      names.push(...statement.declaration.declarations.flatMap(({ id }) => (id.type === 'Identifier' ? [id.name] : [])))
    }
    for (const name of names) if (functions.has(name)) exported.push({ name, statement, fn: functions.get(name) })
  }
  return exported
}

/** Names called in a function and in the functions of the same file that it calls. */
function callsOf(fn, functions, seen = new Set()) {
  const calls = []
  walk(fn.body, (node) => {
    if (node.type !== 'CallExpression') return
    const name = calledName(node)
    calls.push({ name, node })
    if (functions.has(name) && !seen.has(name)) {
      seen.add(name)
      calls.push(...callsOf(functions.get(name), functions, seen).map((call) => ({ ...call, node })))
    }
  })
  return calls
}

const isChange = ({ name }) => name === 'once' || name === '.transaction'

function takesCtx(fn) {
  const first = fn.params[0]
  const reference = first?.type === 'Identifier' ? first.typeAnnotation?.typeAnnotation : undefined
  return (
    reference?.type === 'TSTypeReference' && reference.typeName.type === 'Identifier' && CTX_TYPES.has(reference.typeName.name)
  )
}

function isExempt(sourceCode, statement) {
  const above = sourceCode.getCommentsBefore(statement).at(-1)
  return above?.type === 'Line' && EXEMPTION.test(above.value) && above.loc.end.line === statement.loc.start.line - 1
}

/**
 * A verb is an exported function that takes a Ctx first or that opens a transaction. It calls `authorize` before anything is changed,
 * and when it changes something it calls `writeAudit`. Exempt only with `// no-door: <reason>` in the line above the export.
 * @type {import('eslint').Rule.RuleModule}
 */
export const verbHasDoor = {
  meta: {
    type: 'problem',
    schema: [],
    messages: {
      noDoor: 'The verb {{name}} does not call authorize. Every verb starts at the door.',
      lateDoor: 'The verb {{name}} changes something before it calls authorize.',
      noAudit: 'The verb {{name}} changes something and writes no audit row.',
      reExport: 'A verb is imported from its own file: no re-exports here.',
    },
  },
  create(context) {
    return {
      Program(program) {
        const functions = topLevelFunctions(program)
        for (const { name, statement, fn } of exportedFunctions(program, functions)) {
          const calls = callsOf(fn, functions)
          const changes = calls.filter(isChange)
          if ((changes.length === 0 && !takesCtx(fn)) || isExempt(context.sourceCode, statement)) continue
          const door = calls.find((call) => call.name === 'authorize')
          const report = (messageId) => context.report({ node: fn, messageId, data: { name } })
          if (!door) report('noDoor')
          else if (changes.some(({ node }) => node.range[0] < door.node.range[0])) report('lateDoor')
          if (changes.length > 0 && !calls.some((call) => call.name === 'writeAudit')) report('noAudit')
        }
      },
      ExportAllDeclaration: (node) => context.report({ node, messageId: 'reExport' }),
      'ExportNamedDeclaration[source]': (node) => context.report({ node, messageId: 'reExport' }),
    }
  },
}

/**
 * The callback of a transaction must not be async and must not hand back something to wait for: better-sqlite3 would commit (or undo)
 * before it is done, and a query builder without .run(), .get() or .all() would do nothing at all. Reads types.
 * @type {import('eslint').Rule.RuleModule}
 */
export const noWaitingTransaction = {
  meta: {
    type: 'problem',
    schema: [],
    messages: {
      waits:
        'A transaction callback must finish at once: not async, no promise, and every builder ends in .run(), .get() or .all().',
    },
  },
  create(context) {
    const services = ESLintUtils.getParserServices(context)
    const checker = services.program.getTypeChecker()
    const waits = (callback) => {
      if (callback.async === true) return true
      const signatures = services.getTypeAtLocation(callback).getCallSignatures()
      return signatures.some((signature) => {
        const answer = checker.getReturnTypeOfSignature(signature)
        const parts = answer.isUnion() ? answer.types : [answer]
        return parts.some((part) => part.getProperty('then') !== undefined)
      })
    }
    return {
      CallExpression(call) {
        if (!isChange({ name: calledName(call) })) return
        for (const argument of call.arguments) {
          if (argument.type !== 'SpreadElement' && waits(argument)) context.report({ node: argument, messageId: 'waits' })
        }
      },
    }
  },
}

const SERVER_SOURCE =
  /^(drizzle-orm|better-sqlite3|better-auth|nodemailer|pino|node:|next\/headers|@\/db\/|@\/lib\/server\/|@\/lib\/access\/door)/

/**
 * A module that uses the database, the session or the machine says so, so that no bundle for the browser can take it in.
 * @type {import('eslint').Rule.RuleModule}
 */
export const saysServerOnly = {
  meta: { type: 'problem', schema: [], messages: { missing: "A server module begins with import 'server-only'." } },
  create(context) {
    return {
      Program(program) {
        const imports = program.body.filter((node) => node.type === 'ImportDeclaration' && node.importKind !== 'type')
        const says = imports.some((node) => node.source.value === 'server-only')
        const needs = imports.some((node) => SERVER_SOURCE.test(node.source.value))
        if (needs && !says) context.report({ node: program, messageId: 'missing' })
      },
    }
  },
}

export const daybreathPlugin = {
  rules: { 'verb-has-door': verbHasDoor, 'no-waiting-transaction': noWaitingTransaction, 'says-server-only': saysServerOnly },
}
