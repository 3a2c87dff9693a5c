// Run as a program of its own by the kill test: waits for one line of JSON, opens the database as a server does, then records
// settings through the real verb without a pause, and prints each acknowledged entry. It never ends by itself.
import { writeSync } from 'node:fs'
import { createInterface } from 'node:readline'
import { migrateDatabase, openDatabase } from '@/db/client'
import { recordSettingsSchema } from '@/lib/schemas/settings'
import type { PersonActor } from '@/lib/server/ctx'
import { recordSettings } from '@/lib/services/settings/record'
import { newId } from '@/lib/shared/ids'

export type Orders = {
  file: string
  episodeId: string
  actor: PersonActor
  now: number
  day: string
  time: string
  firstNumber: number
}
export type Acknowledged = { number: number; id: string }

function writeForEver({ file, episodeId, actor, now, day, time, firstNumber }: Orders): never {
  const db = openDatabase(file)
  migrateDatabase(db)
  for (let number = firstNumber; ; number += 1) {
    // The number decides the request: sent again after a kill, it is the same request with the same key.
    const input = recordSettingsSchema.parse({
      episodeId,
      observed: { day, time },
      mode: 'PC-CSV',
      fio2Fraction: 0.4,
      peepCmH2O: 5 + (number % 4),
      setRatePerMin: null,
      setTidalVolumeMl: null,
      inspiratoryPressureCmH2O: null,
      pressureSupportCmH2O: 8,
      measuredRatePerMin: 10 + (number % 15),
      measuredTidalVolumeMl: 420,
      peakPressureCmH2O: null,
      plateauPressureCmH2O: null,
      spo2Percent: 96,
    })
    const ctx = { actor, now, requestId: newId(), db, idempotencyKey: `request-${number}` }
    const { id } = recordSettings(ctx, input)
    writeSync(1, `${JSON.stringify({ number, id } satisfies Acknowledged)}\n`)
  }
}

createInterface({ input: process.stdin }).once('line', (line) => writeForEver(JSON.parse(line) as Orders))
writeSync(1, 'ready\n')
