import { readFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** The folder of a server that belongs to the browser tests: its database, log, process number and kept mail. */
export const testFolder = (name: string) => join(tmpdir(), `daybreath-e2e-${name}`)

/** Empty: set up by the tests as a person would. Demo: the demo hospital. Ward: a unit in the morning. Spare: started and stopped by single tests. */
export const PORTS = { empty: 3211, demo: 3212, ward: 3213, spare: 3214, smtp: 3215, mailbox: 3216 } as const

export const baseUrlOf = (name: 'empty' | 'demo' | 'ward' | 'spare') => `http://localhost:${PORTS[name]}`
export const SMTP_URL = `smtp://127.0.0.1:${PORTS.smtp}`
export const MAILBOX_URL = `http://127.0.0.1:${PORTS.mailbox}`
export const DEMO_PASSWORD = 'browser tests read the demo'

/** The one password of everybody in the ward. */
export const PASSWORD = 'a long enough sentence'

export const PEOPLE = {
  rt: { name: 'Rowan Tidewell', email: 'rt@ward.example' },
  nurse: { name: 'Noor Nightgale', email: 'nurse@ward.example' },
  physician: { name: 'Parrish Fenn', email: 'physician@ward.example' },
  lead: { name: 'Lennox Amberly', email: 'lead@ward.example' },
  outsider: { name: 'Otis Farside', email: 'outsider@ward.example' },
  administrator: { name: 'Ada Keyholder', email: 'administrator@ward.example' },
  resetter: { name: 'Remy Forgetter', email: 'resetter@ward.example' },
  sleeper: { name: 'Sol Drowsing', email: 'sleeper@ward.example' },
} as const
export type Who = keyof typeof PEOPLE

/** One patient for each test that changes one, so that no test reads what another wrote. */
export const PATIENTS = {
  day: 'M01',
  rt: 'M02',
  nurse: 'M03',
  physician: 'M04',
  values: 'M05',
  keyboard: 'M06',
  idle: 'M07',
  excuse: 'M08',
  breathing: 'M09',
  screen: 'M10',
  holdStart: 'M11',
  onHold: 'M12',
  trialStart: 'M13',
  onTrial: 'M14',
  decision: 'M15',
  end: 'M16',
  move: 'M17',
  leaving: 'M18',
  lone: 'M19',
  reader: 'M20',
} as const
export type PatientKey = keyof typeof PATIENTS

/** What stands in a filled ward, by the names the tests use. */
export type Ward = {
  zone: string
  unitId: string
  otherUnitId: string
  patients: Record<
    PatientKey,
    { patientId: string; episodeId: string; stayId: string; bed: string; familyName: string; recordNumber: string }
  >
  running: { holdId: string; trialId: string }
  freeBeds: { id: string; label: string }[]
  outsidePatient: { patientId: string; episodeId: string; recordNumber: string }
}

export function readWard(name = 'ward'): Ward {
  return JSON.parse(readFileSync(join(testFolder(name), 'ward.json'), 'utf8')) as Ward
}

/** A whole-hour time zone in which it is between seven and eight in the morning now: inside the default screening window at any hour of the tests. */
export function morningZone(now = new Date()): string {
  const hoursEast = ((7 - now.getUTCHours() + 36) % 24) - 12
  if (hoursEast === 0) return 'Etc/GMT'
  return `Etc/GMT${hoursEast > 0 ? '-' : '+'}${Math.abs(hoursEast)}`
}
