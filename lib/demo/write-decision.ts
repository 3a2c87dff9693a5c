import { signedStatement } from '@/lib/schemas/decision-statement'
import { contentHash } from '@/lib/services/decisions/content-hash'
import { formatDay, formatMinutes } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'
import type { DecisionScript } from './script'
import { entry, unitAt, type Course, type World } from './world'

/** Adds a decision. No page was shown and nobody signed, so its evidence and its statement say that it is invented. */
export function writeDecision(world: World, course: Course, script: DecisionScript): void {
  const { choice, reasons, note, supportAfter } = script
  const base = entry(world, course, script.atMs, 'physician', 0)
  const steroidsPlanned = choice === 'extubate' ? false : null
  const evidence = { ventilatorDay: base.ventilatorDay, invented: 'Demo history: no page was shown and nobody signed.' }
  const plan = { reasons, lookAgainAt: script.lookAgainMs, supportAfter, steroidsPlanned, note }
  const words = signedStatement(
    { choice, ...plan, lookAgainWords: script.lookAgainMs === null ? null : clock(world, script.lookAgainMs) },
    {
      name: nameOf(world, base.recordedBy),
      unitName: unitAt(course.stays, script.atMs).name,
      timeWords: clock(world, script.atMs),
    },
  )
  const statement = `Invented. ${words}`
  world.rows.decisions.push({
    ...base,
    choice,
    ...plan,
    evidence,
    contentHash: contentHash({ evidence, choice, plan, statement }),
    statement,
  })
}

function nameOf({ rows }: World, personId: string): string {
  return rows.people.find(({ id }) => id === personId)?.name ?? 'somebody'
}

/** "05:40 on 1 Dec 2026". Look-again times may lie beyond today, which the calendar ends with. */
function clock({ calendar }: World, ms: number): string {
  const index = calendar.indexOf(ms)
  const minutes = Math.round((ms - calendar.at(index, 0)) / MINUTE_MS)
  const day = minutes < 1440 ? calendar.dayOf(ms) : calendar.dayAfterToday
  return `${formatMinutes(minutes % 1440)} on ${formatDay(day)}`
}
