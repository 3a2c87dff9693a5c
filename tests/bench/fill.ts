import { migrateDatabase, openDatabase } from '@/db/client'
import { fillDemo } from '@/lib/services/demo/fill'
import { newId } from '@/lib/shared/ids'

// Fills one database for the bench: file, ventilated beds, days of history. Two years of history lie in 28 beds, whatever the number of beds.
const [file = '', beds = '28', historyDays = '730', password = ''] = process.argv.slice(2)
const db = openDatabase(file)
migrateDatabase(db)
const ctx = { actor: { kind: 'system' as const }, now: Date.now(), requestId: newId(), db, idempotencyKey: null }
const units = [
  { name: 'Bench ICU', prefix: 'B', beds: Number(beds), historyBeds: Math.min(28, Number(beds)), isEveryBedVentilated: true },
]
const filled = await fillDemo(ctx, { password, historyDays: Number(historyDays), units })
db.$client.exec('analyze')
db.$client.close()
console.log(JSON.stringify(filled))
