// npm run typecheck: Next writes the types of the routes, then the compiler looks at everything.
import { main, mustRun, NEXT } from './process.mjs'
import { setup } from './setup.mjs'

async function typecheck() {
  await setup()
  await mustRun('Writing route types', process.execPath, [NEXT, 'typegen'], {
    env: { NEXT_TELEMETRY_DISABLED: '1' },
    quiet: true,
  })
  await mustRun('The type check', process.execPath, ['node_modules/typescript/bin/tsc', '--noEmit'])
}

main(import.meta.url, typecheck)
