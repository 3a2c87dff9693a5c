import { join } from 'node:path'
import { describe, expect, it, onTestFinished } from 'vitest'
import { patients } from '@/db/schema'
import { KEPT_FOR_MS } from '@/lib/services/today/kept-today'
import { listToday } from '@/lib/services/today/list'
import { makeTestFolder, openTestDatabaseFile } from '@/tests/helpers/database'
import { addScreen } from '@/tests/helpers/day'
import { makeCtx, makeWorld, NOW } from '@/tests/helpers/factories'

describe('Today asked for again within a second', () => {
  it('is the same answer while nothing changed, and a new one after a second', () => {
    const { db, rt, nurse, medical } = makeWorld()
    const unitId = medical.unit.id
    const first = listToday(makeCtx(db, rt), { unitId })
    expect(listToday(makeCtx(db, nurse, NOW + KEPT_FOR_MS - 1), { unitId })).toBe(first)
    const later = listToday(makeCtx(db, rt, NOW + KEPT_FOR_MS), { unitId })
    expect(later.nowMs).toBe(NOW + KEPT_FOR_MS)
    expect(listToday(makeCtx(db, rt), { unitId }).nowMs).toBe(NOW)
  })

  it('shows an entry at once, in the same millisecond', () => {
    const { db, rt, medical, episode, place } = makeWorld()
    const unitId = medical.unit.id
    expect(listToday(makeCtx(db, rt), { unitId }).counts.screened).toBe(0)
    addScreen(db, episode, place, { result: 'ready', observedAt: NOW })
    expect(listToday(makeCtx(db, rt), { unitId }).counts.screened).toBe(1)
  })

  it('shows what another process wrote to the same file', () => {
    const file = join(makeTestFolder(), 'kept.db')
    const db = openTestDatabaseFile(file)
    const { rt, medical } = makeWorld(db)
    const other = openTestDatabaseFile(file)
    onTestFinished(() => {
      db.$client.close()
      other.$client.close()
    })
    const unitId = medical.unit.id
    listToday(makeCtx(db, rt), { unitId })
    other.update(patients).set({ familyName: 'Renamed' }).run()
    expect(listToday(makeCtx(db, rt), { unitId }).rows[0]?.familyName).toBe('Renamed')
  })

  it('is refused to someone outside the unit all the same', () => {
    const { db, rt, outsider, medical } = makeWorld()
    const unitId = medical.unit.id
    listToday(makeCtx(db, rt), { unitId })
    expect(() => listToday(makeCtx(db, outsider), { unitId })).toThrow(expect.objectContaining({ code: 'NOT_FOUND' }))
  })

  it('is kept for each unit by itself', () => {
    const { db, rt, outsider, medical, surgical } = makeWorld()
    expect(listToday(makeCtx(db, rt), { unitId: medical.unit.id }).rows).toHaveLength(1)
    expect(listToday(makeCtx(db, outsider), { unitId: surgical.unit.id }).rows).toHaveLength(0)
  })
})
