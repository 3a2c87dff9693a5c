// Part of npm run check: every path that the documents name in backticks exists.
import { existsSync, readFileSync } from 'node:fs'
import { basename, join } from 'node:path'
import { main, Refusal, ROOT, say } from './process.mjs'
import { listFiles } from './stamp.mjs'

const DOCUMENTS = ['README.md', 'DEVELOPERS.md']
const OUR_FOLDERS = ['app', 'components', 'db', 'jobs', 'lib', 'tests']
const TOP = /^(app|components|db|jobs|lib|tests|public|docs|\.ci)(\/|$)/
/** A file at the root, by the endings that ours have. Made at run time, so absent from a fresh checkout: data and .env. */
const ROOT_FILE = /^[A-Za-z.-]+\.(ts|mts|mjs|cjs|json|md|example)$/

/** Paths in backticks of a text that look like paths of this project. Placeholders such as `lib/<name>` or globs stand for their folder. */
export function namedPaths(text) {
  const withoutFences = text.replace(/```[\s\S]*?```/g, '')
  return [...withoutFences.matchAll(/`([^`\s]+)`/g)]
    .map(([, path = '']) => path.replace(/:\d+$/, ''))
    .filter((path) => TOP.test(path) || ROOT_FILE.test(path))
    .map((path) => path.replace(/\/?[^/]*[<*{…].*$/, ''))
    .filter((path) => path !== '')
}

/** The named paths that do not exist below the root. A bare file name, as in a list under its folder, may stand in any of ours. */
export function missingPaths(text, root) {
  const names = new Set(listFiles(root, OUR_FOLDERS).map((path) => basename(path)))
  const isThere = (path) => existsSync(join(root, path)) || (!path.includes('/') && names.has(path))
  return [...new Set(namedPaths(text))].filter((path) => !isThere(path))
}

async function checkDocPaths() {
  const missing = DOCUMENTS.flatMap((document) => {
    if (!existsSync(join(ROOT, document))) return [`${document} itself`]
    return missingPaths(readFileSync(join(ROOT, document), 'utf8'), ROOT).map((path) => `${document}: ${path}`)
  })
  if (missing.length > 0) throw new Refusal(`These paths do not exist:\n  ${missing.join('\n  ')}`)
  say('Every path named in the documents exists.')
}

main(import.meta.url, checkDocPaths)
