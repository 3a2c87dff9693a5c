import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ProtocolContent, ScreenRule } from '@/lib/weaning/protocol'
import type { DemoUnit, World } from './world'

const PRACTICE = 'unit practice, no source (invented)'
const spo2: ScreenRule = { kind: 'number', criterion: 'spo2', limits: [{ comparator: 'atLeast', value: 88 }], source: PRACTICE }
const effort: ScreenRule = { kind: 'yesNo', criterion: 'spontaneousEffort', expect: true, source: PRACTICE }

const second: ProtocolContent = { ...defaultProtocol, screen: [...defaultProtocol.screen, spo2] }
const third: ProtocolContent = {
  ...defaultProtocol,
  screen: [...second.screen, effort],
  trial: { ...defaultProtocol.trial, startWithinMin: 45 },
  decision: { answerWithinMin: 45, extubateWithinMin: 120 },
}
/** The last version's window differs by unit, so that the demo shows both an open and a closed one. */
const LAST_WINDOWS = [
  { opensMin: 300, closesMin: 570 },
  { opensMin: 270, closesMin: 480 },
] as const

/** Adds a unit's protocol history: the product's default, two approved versions, and a draft that waits for a physician in the first unit. */
export function addProtocols(world: World, unit: DemoUnit, place: number, by: { lead: string; physician: string }): void {
  const { calendar, random, rows } = world
  const days = calendar.todayIndex
  const window = LAST_WINDOWS[place % LAST_WINDOWS.length] ?? LAST_WINDOWS[0]
  const versions = [
    { dayIndex: 0, content: defaultProtocol, note: 'Default values of the product.' },
    { dayIndex: Math.floor(days * 0.3), content: second, note: 'SpO2 added to the screen: at least 88 %, for our altitude.' },
    {
      dayIndex: Math.floor(days * 0.78),
      content: { ...third, screeningWindow: window },
      note: 'Spontaneous effort added, answers asked for sooner, new screening hours.',
    },
  ]
  versions.forEach(({ dayIndex, content, note }, index) => {
    const id = random.id()
    const startsAt = calendar.at(dayIndex, 0)
    const isDefault = index === 0
    unit.protocols.push({ id, startsAt, content })
    rows.protocolVersions.push({
      id,
      unitId: unit.id,
      number: index + 1,
      content,
      note,
      isDefault,
      draftedAt: calendar.at(dayIndex - 4, 600),
      draftedBy: isDefault ? null : by.lead,
      approvedAt: isDefault ? null : calendar.at(dayIndex - 1, 840),
      approvedBy: isDefault ? null : by.physician,
      startsAt,
      version: 1,
    })
  })
  if (place > 0) return
  rows.protocolVersions.push({
    id: random.id(),
    unitId: unit.id,
    number: versions.length + 1,
    content: { ...third, screeningWindow: window, pairingWindowMin: 90 },
    note: 'Hold and trial closer together: pairing window of 90 minutes.',
    isDefault: false,
    draftedAt: calendar.at(days - 2, 615),
    draftedBy: by.lead,
    approvedAt: null,
    approvedBy: null,
    startsAt: null,
    version: 1,
  })
}
