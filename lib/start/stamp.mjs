// A stamp tells whether a step was already done for exactly these files.
import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

/** All files below the given paths (folders or files, relative to the root), sorted; paths that do not exist are left out. */
export function listFiles(root, paths) {
  const found = []
  const visit = (path) => {
    const full = join(root, path)
    if (!existsSync(full)) return
    if (!statSync(full).isDirectory()) found.push(path)
    else for (const name of readdirSync(full)) visit(`${path}/${name}`)
  }
  paths.forEach(visit)
  return found.sort()
}

/** Hash over names and contents of files, and over further facts such as the Node version. */
export function hashFiles(root, paths, facts = []) {
  const hash = createHash('sha256').update(JSON.stringify(facts))
  for (const file of listFiles(root, paths)) hash.update(`\0${file}\0`).update(readFileSync(join(root, file)))
  return hash.digest('hex')
}

/** Whether the step was done for this hash. */
export function isStamped(file, hash) {
  return existsSync(file) && readFileSync(file, 'utf8').trim() === hash
}

export function writeStamp(file, hash) {
  writeFileSync(file, `${hash}\n`)
}

export function removeStamp(file) {
  rmSync(file, { force: true })
}
