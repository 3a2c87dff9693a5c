// The bench itself: fills two databases, starts a server on each, measures, prints. Started by lib/start/bench.mjs with a folder to work in.
import { runProgram } from '../../lib/start/process.mjs'
import { compareThroughput, medianLatencyMs, memoryOver } from './load.mjs'
import { scriptPerPage, timeToToday } from './pages.mjs'
import { startServer } from './server.mjs'

const [folder] = process.argv.slice(2)
const number = (value, decimals = 1) => value.toFixed(decimals)
const line = (label, text) => console.log(`  ${label.padEnd(58)} ${text}`)

async function inProcess(database, env) {
  const lines = []
  if ((await runProgram('tests/bench/in-process.ts', [database], { env, onLine: (text) => lines.push(text) })) !== 0)
    throw new Error(lines.join('\n'))
  return JSON.parse(lines.find((text) => text.startsWith('{')))
}

const servers = []
try {
  console.log('Filling: 28 and 1,000 ventilated patients, two years of history each.')
  const small = await startServer({ folder, name: 'small', beds: 28, historyDays: 730, port: 3391 })
  servers.push(small)
  const large = await startServer({ folder, name: 'large', beds: 1000, historyDays: 730, port: 3392 })
  servers.push(large)
  const todayOf = ({ unitId }) => `/api/units/${unitId}/today`

  console.log('\nToday’s API, requests per second over 10 connections, medians of rounds taken in turn')
  const rates = await compareThroughput(small, {
    constant: '/api/bench/constant',
    session: '/api/bench/session',
    today: todayOf(small),
  })
  line('(a) a route handler that returns a constant', `${number(rates.constant)} /s`)
  line('(b) the same behind the session check', `${number(rates.session)} /s`)
  line(
    'Today, 28 patients',
    `${number(rates.today)} /s, ${number(rates.today / rates.session, 2)} of (b), ${number(rates.today / rates.constant, 2)} of (a)`,
  )
  const largeRates = await compareThroughput(large, { session: '/api/bench/session', today: todayOf(large) }, { rounds: 3 })
  line('Today, 1,000 patients', `${number(largeRates.today)} /s, ${number(largeRates.today / largeRates.session, 3)} of (b)`)

  console.log('\nServer time, in one process, worked out anew at each call')
  const [few, many] = [await inProcess(small.database, small.env), await inProcess(large.database, large.env)]
  for (const one of [few, many]) {
    line(
      `Today’s verb, ${one.rows} rows shown`,
      `${number(one.todayMs, 2)} ms, as JSON ${number(one.todayWithJsonMs, 2)} ms, ${number(one.bytes / 1000)} kB`,
    )
    line(
      `(c) the same rows raw through better-sqlite3 (${one.rawRows} rows)`,
      `${number(one.rawMs, 2)} ms; the verb takes ${number(one.todayMs / one.rawMs, 1)} times as long`,
    )
  }
  line(
    'growth of rows shown, of server time',
    `${number(many.rows / few.rows)} times, ${number(many.todayMs / few.todayMs)} times`,
  )

  console.log('\nReview over two years, one request after another')
  line('GET review', `${number(await medianLatencyMs(small, `/api/units/${small.unitId}/review`))} ms`)

  const today = await (await fetch(small.address + todayOf(small), { headers: { cookie: small.cookie } })).json()
  const { patientId, episodeId } = today.rows.find(({ endedAtMs }) => endedAtMs === null)
  const paths = {
    empty: '/bench-empty',
    Today: `/units/${small.unitId}/today`,
    Patients: `/units/${small.unitId}/patients`,
    Patient: `/patients/${patientId}`,
    Screen: `/episodes/${episodeId}/screen`,
    Hold: `/episodes/${episodeId}/hold`,
    Trial: `/episodes/${episodeId}/trial`,
    Decision: `/episodes/${episodeId}/decision`,
    Review: `/units/${small.unitId}/review`,
    Protocol: `/units/${small.unitId}/protocol`,
    'Protocol draft': `/units/${small.unitId}/protocol/edit`,
    Mail: `/units/${small.unitId}/mail`,
    Account: '/account',
  }
  console.log('\nScript that each page ships, compressed')
  const sizes = await scriptPerPage(small, paths)
  for (const [name, size] of Object.entries(sizes))
    line(name, `${number(size)} kB${name === 'empty' ? '' : `, ${number(size - sizes.empty)} kB above the empty page`}`)
  const usable = await timeToToday(small, paths.Today)
  console.log('\nTime to a usable Today, 28 patients')
  line('new browser; again with a full cache', `${number(usable.cold, 0)} ms; ${number(usable.warm, 0)} ms`)

  console.log('\nThe server’s memory over 10,000 requests of Today, resident')
  const steps = await memoryOver(small, todayOf(small))
  line('at each 1,000', steps.map((value) => number(value, 0)).join(' '))
  line('change from the first to the last', `${number((steps.at(-1) / steps[0] - 1) * 100)} %`)
} finally {
  for (const server of servers) server.stop()
}
