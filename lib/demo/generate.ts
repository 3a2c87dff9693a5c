import { emptySeedRows, type SeedRows } from '@/db/seed'
import { makeCalendar } from './calendar'
import { writeHistory, type HistoryBed } from './history'
import { addProtocols } from './protocols'
import { makeRandom } from './random'
import { scenesOf, SCENES } from './scenes'
import { addStaff, type DemoAccount } from './staff'
import type { DemoUnit, World } from './world'
import { MINUTE_MS } from '@/lib/shared/time'

export type DemoUnitSpec = {
  name: string
  /** Before the two-digit (or longer) number of a bed. */
  prefix: string
  beds: number
  /** Beds that have a history; all when left out. Keeps a unit of a thousand beds from growing a thousand histories. */
  historyBeds?: number
  isEveryBedVentilated?: boolean
}
export type DemoOptions = { seed: number; nowMs: number; timeZone: string; historyDays: number; units: DemoUnitSpec[] }
export type Demo = { rows: SeedRows; accounts: DemoAccount[]; unitIds: string[] }

export const DEMO_UNITS: DemoUnitSpec[] = [
  { name: 'Medical ICU', prefix: 'M', beds: 16 },
  { name: 'Surgical ICU', prefix: 'S', beds: 12 },
]
const ALTITUDE_M = 1450

/**
 * Makes the invented hospital: staff, patients, days of history up to now, and every state of the day in its beds. The same options give
 * the same rows. Take a time zone in which it is morning (demoTimeZone); history of at least 20 days.
 */
export function generateDemo({ seed, nowMs, timeZone, historyDays, units }: DemoOptions): Demo {
  const random = makeRandom(seed)
  const calendar = makeCalendar(nowMs, timeZone, historyDays)
  const world: World = { random, calendar, nowMs, hospitalId: random.id(), units: [], rows: emptySeedRows() }
  const createdAt = calendar.at(0, 0)
  world.rows.hospitals.push({
    id: world.hospitalId,
    name: 'Kestrel Ridge Hospital',
    isDemo: true,
    idleLockMin: 15,
    createdAt,
    version: 1,
  })
  for (const spec of units) addUnit(world, spec, timeZone, createdAt)
  const { accounts, leadId, physicianId } = addStaff(world)
  world.units.forEach((unit, place) => addProtocols(world, unit, place, { lead: leadId, physician: physicianId }))
  writeHistory(
    world,
    units.flatMap((spec, index) => writePresent(world, spec, index)),
  )
  return { rows: world.rows, accounts, unitIds: world.units.map(({ id }) => id) }
}

function addUnit({ random, rows, units, hospitalId }: World, spec: DemoUnitSpec, timeZone: string, createdAt: number): void {
  const unit: DemoUnit = {
    id: random.id(),
    name: spec.name,
    beds: [],
    protocols: [],
    staff: { rt: [], nurse: [], physician: [] },
  }
  units.push(unit)
  rows.units.push({
    id: unit.id,
    hospitalId,
    name: spec.name,
    timeZone,
    altitudeM: ALTITUDE_M,
    barometricPressureMmHg: null,
    dayTrackFromHour: 4,
    dayTrackToHour: 20,
    createdAt,
    retiredAt: null,
    version: 1,
  })
  for (let number = 1; number <= spec.beds; number += 1) {
    const bed = { id: random.id(), label: `${spec.prefix}${String(number).padStart(2, '0')}` }
    unit.beds.push(bed)
    rows.beds.push({ ...bed, unitId: unit.id, sortOrder: number, createdAt, retiredAt: null })
  }
  rows.mailSchedules.push({ unitId: unit.id, morningDueMin: 330, isWindowEndOn: true, isDecisionOwedOn: true, version: 1 })
}

/** Writes who lies in the unit's beds now. Answers the beds that have a history before them. */
function writePresent(world: World, spec: DemoUnitSpec, index: number): HistoryBed[] {
  const unit = world.units[index]
  if (!unit) throw new Error('The unit is not there yet.')
  const scenes = scenesOf(index, spec.beds, spec.isEveryBedVentilated ?? false)
  return unit.beds.flatMap((bed, place) => {
    const scene = scenes[place]
    const takenMs = scene ? SCENES[scene](world, { unit, bed }) : null
    if (place >= (spec.historyBeds ?? spec.beds)) return []
    const freeMs = world.calendar.at(0, 0) + world.random.whole(0, 1600) * MINUTE_MS
    return [{ unit, bed, freeMs, takenMs: (takenMs ?? world.nowMs - 90 * MINUTE_MS) - 20 * MINUTE_MS }]
  })
}
