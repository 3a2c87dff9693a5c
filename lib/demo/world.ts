import type { SeedRows } from '@/db/seed'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import { MINUTE_MS } from '@/lib/shared/time'
import type { Calendar } from './calendar'
import type { Random } from './random'

export type Staff = { rt: string[]; nurse: string[]; physician: string[] }
export type DemoUnit = {
  id: string
  name: string
  beds: { id: string; label: string }[]
  /** Oldest start first. */
  protocols: { id: string; startsAt: number; content: ProtocolContent }[]
  staff: Staff
}

/** What every part of the generator works on; rows are only ever added. */
export type World = { random: Random; calendar: Calendar; nowMs: number; hospitalId: string; units: DemoUnit[]; rows: SeedRows }

export type DemoPatient = SeedRows['patients'][number]
/** Where the patient was: consecutive stays, the last one open for those still there. */
export type PlacedStay = {
  unit: DemoUnit
  bed: { id: string }
  startMs: number
  endMs: number | null
  end: 'moved' | 'left_unit' | 'died' | null
}

/** One run of ventilation while its entries are written. */
export type Course = { episodeId: string; patient: DemoPatient; stays: readonly PlacedStay[] }

export function unitAt(stays: readonly PlacedStay[], ms: number): DemoUnit {
  const stay = stays.findLast((one) => one.startMs <= ms) ?? stays[0]
  if (!stay) throw new Error('The patient was in no unit.')
  return stay.unit
}

export function protocolAt(unit: DemoUnit, ms: number): DemoUnit['protocols'][number] {
  const protocol = unit.protocols.findLast(({ startsAt }) => startsAt <= ms) ?? unit.protocols[0]
  if (!protocol) throw new Error(`${unit.name} has no protocol.`)
  return protocol
}

/** The columns that every entry carries, first version, recorded a few minutes after it was observed and now and then much later. */
export function entry(world: World, course: Course, observedAt: number, role: keyof Staff, lateMin?: number) {
  const { random, calendar, nowMs } = world
  const unit = unitAt(course.stays, observedAt)
  const id = random.id()
  const lagMin = lateMin ?? (random.chance(0.04) ? random.between(40, 200) : random.between(1, 9))
  return {
    id,
    entryId: id,
    entryVersion: 1,
    supersedesId: null,
    amendReason: null,
    isWithdrawn: false,
    episodeId: course.episodeId,
    unitId: unit.id,
    ventilatorDay: calendar.dayOf(observedAt),
    observedAt,
    recordedAt: Math.max(observedAt, Math.min(nowMs, observedAt + Math.round(lagMin * MINUTE_MS))),
    recordedBy: random.pick(unit.staff[role]),
    protocolVersionId: protocolAt(unit, observedAt).id,
  }
}
