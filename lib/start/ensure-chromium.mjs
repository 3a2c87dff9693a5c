// Finds the browser for the end-to-end tests, and installs it on Debian. Without one the tests fail; they are never skipped.
import { accessSync, constants, existsSync, readFileSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { main, Refusal, run, say } from './process.mjs'

const NAMES = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome', 'chrome']
const OTHER_PLACES = [
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
]

function isProgram(path) {
  try {
    accessSync(path, constants.X_OK)
    return true
  } catch {
    return false
  }
}

/**
 * Path of an installed browser, or null. DAYBREATH_CHROMIUM wins; when it is set and wrong, that is an error.
 * @param {Record<string, string | undefined>} [env]
 */
export function findChromium(env = process.env) {
  const named = env.DAYBREATH_CHROMIUM
  if (named) {
    if (!isProgram(named)) throw new Refusal(`DAYBREATH_CHROMIUM names ${named}, which is not a program.`)
    return named
  }
  const folders = (env.PATH ?? '').split(delimiter).filter(Boolean)
  const places = [...folders.flatMap((folder) => NAMES.map((name) => join(folder, name))), ...OTHER_PLACES]
  return places.find(isProgram) ?? null
}

function isDebianRoot() {
  const file = '/etc/os-release'
  return process.getuid?.() === 0 && existsSync(file) && /^(ID|ID_LIKE)=.*debian/m.test(readFileSync(file, 'utf8'))
}

/** Path of a browser; installs Debian's when there is none and we may. */
export async function ensureChromium() {
  const found = findChromium()
  if (found) return found
  if (!isDebianRoot()) {
    throw new Refusal(
      'The end-to-end tests need Chromium. Install it (Debian: apt-get install chromium) or name it in DAYBREATH_CHROMIUM.',
    )
  }
  say('Installing Chromium.')
  const env = { DEBIAN_FRONTEND: 'noninteractive' }
  const isListed = (await run('apt-get', ['update'], { env, quiet: true })) === 0
  const isInstalled =
    isListed && (await run('apt-get', ['install', '-y', '--no-install-recommends', 'chromium'], { env, quiet: true })) === 0
  const path = isInstalled ? findChromium() : null
  if (!path) throw new Refusal('Chromium could not be installed, and the end-to-end tests do not run without it.')
  return path
}

main(import.meta.url, async () => say(await ensureChromium()))
