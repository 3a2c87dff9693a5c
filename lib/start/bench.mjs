// npm run bench: measures, on this machine and in one run, what DEVELOPERS.md quotes as ratios. Never part of the tests.
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { main, run } from './process.mjs'
import { setup } from './setup.mjs'

/** The bench has a build of its own, with the routes that it compares against. */
const DIST = '.next-bench'

async function bench() {
  await setup()
  Object.assign(process.env, { DAYBREATH_BENCH: '1', DAYBREATH_DIST: DIST })
  const { build } = await import('./build.mjs')
  await build()
  const folder = mkdtempSync(join(tmpdir(), 'daybreath-bench-'))
  try {
    process.exitCode = await run(process.execPath, ['tests/bench/run.mjs', folder])
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

main(import.meta.url, bench)
