// Part of npm run check: every path that the documents name in backticks exists.
import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { main, Refusal, ROOT, say } from './process.mjs'

const DOCUMENTS = ['README.md', 'DEVELOPERS.md']
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

/** The named paths that do not exist below the root. */
export function missingPaths(text, root) {
  return [...new Set(namedPaths(text))].filter((path) => !existsSync(join(root, path)))
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
