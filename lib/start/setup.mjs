// npm run setup: installs what the lock file names, when that has not been done yet.
import { existsSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { main, mustRun, Refusal, ROOT, run, runNpm, say } from './process.mjs'
import { hashFiles, isStamped, removeStamp, writeStamp } from './stamp.mjs'

const STAMP = join(ROOT, 'node_modules', '.daybreath-setup')
const LEAST_NODE = [20, 12]

/** Where this Node keeps its headers, so that the database addon can be compiled without a download. */
function compilerSettings() {
  const prefix = dirname(dirname(process.execPath))
  const hasHeaders = existsSync(join(prefix, 'include', 'node', 'node.h'))
  return { JOBS: 'max', ...(hasHeaders ? { npm_config_nodedir: prefix } : {}) }
}

/** Whether an installation made by hand already is what the lock file names, and the database addon loads. */
async function isInstalledByHand() {
  const hidden = join(ROOT, 'node_modules', '.package-lock.json')
  if (!existsSync(hidden)) return false
  const installed = JSON.parse(readFileSync(hidden, 'utf8')).packages
  const wanted = JSON.parse(readFileSync(join(ROOT, 'package-lock.json'), 'utf8')).packages
  const isSame = Object.entries(wanted).every(
    ([path, entry]) => path === '' || entry.optional || entry.devOptional || installed[path]?.version === entry.version,
  )
  const loads = "new (require('better-sqlite3'))(':memory:').close()"
  return isSame && (await run(process.execPath, ['-e', loads], { quiet: true })) === 0
}

/** Installs when needed; a second call does nothing and takes milliseconds. */
export async function setup() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
  if (major < LEAST_NODE[0] || (major === LEAST_NODE[0] && minor < LEAST_NODE[1])) {
    throw new Refusal(`Daybreath needs Node ${LEAST_NODE.join('.')} or newer; this is ${process.versions.node}.`)
  }
  const hash = hashFiles(ROOT, ['package-lock.json'], [process.versions.modules, process.platform, process.arch])
  if (isStamped(STAMP, hash)) return
  if (!(await isInstalledByHand())) {
    say('Installing packages. The first time this takes two to four minutes, because the database is compiled.')
    removeStamp(STAMP)
    const code = await runNpm(['ci', '--no-audit', '--no-fund'], { env: compilerSettings() })
    if (code !== 0)
      throw new Refusal(
        'The packages could not be installed. A compiler (make, g++, python3) and the package registry are needed.',
      )
    await mustRun('Loading the database', process.execPath, ['-e', "require('better-sqlite3')"])
  }
  writeStamp(STAMP, hash)
}

main(import.meta.url, setup)
