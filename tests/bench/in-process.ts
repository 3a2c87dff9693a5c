import { openDatabase } from '@/db/client'
import { listToday } from '@/lib/services/today/list'
import { newId } from '@/lib/shared/ids'

// Times the Today verb, and the same rows read raw through better-sqlite3, in this one process. Prints JSON.
const db = openDatabase(process.argv[2] ?? '')
const unitId = String(db.$client.prepare('select id from units limit 1').pluck().get())
// A second later each time, so that every call works the day out anew rather than giving the kept answer again.
let calls = 0
const ctx = () => ({
  actor: { kind: 'job' as const, name: 'bench' },
  now: Date.now() + (calls += 1) * 1000,
  requestId: newId(),
  db,
  idempotencyKey: null,
})

const TABLES = ['screens', 'holds', 'hold_observations', 'hold_ends', 'trials', 'trial_observations', 'trial_ends', 'decisions']
const today = listToday(ctx(), { unitId })
const ids = today.rows.map(({ episodeId }) => episodeId)
const among = ids.map(() => '?').join(',')
const patients = db.$client.prepare(
  'select * from stays join patients on patients.id = stays.patient_id join beds on beds.id = stays.bed_id where stays.unit_id = ? and stays.ended_at is null',
)
const entries = TABLES.map((table) =>
  db.$client.prepare(`select * from ${table} where episode_id in (${among}) and ventilator_day >= ?`),
)
const settings = db.$client.prepare(`select *, max(observed_at) from settings where episode_id in (${among}) group by episode_id`)
const since = new Date(Date.parse(today.day) - 86_400_000).toISOString().slice(0, 10)

function readRaw(): number {
  return (
    patients.all(unitId).length +
    settings.all(...ids).length +
    entries.reduce((sum, one) => sum + one.all(...ids, since).length, 0)
  )
}

/** Median milliseconds of one call, over about two seconds. */
function medianMs(work: () => unknown): number {
  for (let index = 0; index < 5; index += 1) work()
  const times: number[] = []
  for (const end = Date.now() + 2000; Date.now() < end || times.length < 20;) {
    const from = process.hrtime.bigint()
    work()
    times.push(Number(process.hrtime.bigint() - from) / 1e6)
  }
  return times.sort((a, b) => a - b)[Math.floor(times.length / 2)] ?? NaN
}

console.log(
  JSON.stringify({
    rows: today.rows.length,
    bytes: JSON.stringify(today).length,
    todayMs: medianMs(() => listToday(ctx(), { unitId })),
    todayWithJsonMs: medianMs(() => JSON.stringify(listToday(ctx(), { unitId }))),
    rawRows: readRaw(),
    rawMs: medianMs(readRaw),
  }),
)
