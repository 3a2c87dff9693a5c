import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'
import { decisionOwedMessage, morningDueMessage, windowEndMessage, type BedLine } from '@/lib/mail/templates'
import type { Message } from '@/lib/mail/message'
import { formatDay, formatMinutes, formatTime } from '@/lib/shared/format'
import { HOUR_MS, wallClockMs } from '@/lib/shared/time'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ClinicalRole, MailKind } from '@/lib/weaning/vocabulary'

export type DueMessage = { kind: MailKind; occasion: string; toRoles: ClinicalRole[]; message: Message }
type Schedule = { morningDueMin: number | null; isWindowEndOn: boolean; isDecisionOwedOn: boolean }

/** After the window closed, the reminder is still of use for this long; a server that was down longer lets it go. */
export const WINDOW_END_USEFUL_MS = 3 * HOUR_MS

/**
 * What a unit's mail owes at this moment, from the same moves that Today shows. The caller queues each once.
 * morning_due: from its time until the window closes, as soon as anybody is due. window_end: from the close, for 3 h.
 * decision_owed: once a passed trial has waited longer than the protocol allows.
 */
export function dueMessages(today: TodayDto, content: ProtocolContent, schedule: Schedule, baseUrl: string): DueMessage[] {
  const { unit, day, nowMs } = today
  const url = `${baseUrl}/units/${unit.id}/today`
  const { opensMin, closesMin } = content.screeningWindow
  const closesMs = wallClockMs(day, closesMin, unit.timeZone)
  const shared = { unitName: unit.name, dayText: formatDay(day), url }
  const beds = today.rows.filter(isUnscreened).map(toBedLine)
  const due: DueMessage[] = []
  if (schedule.morningDueMin !== null && beds.length > 0) {
    const fromMs = wallClockMs(day, schedule.morningDueMin, unit.timeZone)
    if (nowMs >= fromMs && nowMs < closesMs) {
      const windowText = `between ${formatMinutes(opensMin)} and ${formatMinutes(closesMin)}`
      due.push({
        kind: 'morning_due',
        occasion: day,
        toRoles: ['rt'],
        message: morningDueMessage({ ...shared, windowText, beds }),
      })
    }
  }
  if (schedule.isWindowEndOn && beds.length > 0 && nowMs >= closesMs && nowMs < closesMs + WINDOW_END_USEFUL_MS) {
    const message = windowEndMessage({ ...shared, closedText: formatMinutes(closesMin), beds })
    due.push({ kind: 'window_end', occasion: day, toRoles: ['rt', 'unit_lead'], message })
  }
  return schedule.isDecisionOwedOn
    ? [...due, ...today.rows.flatMap((row) => decisionOwed(row, shared, unit.timeZone, nowMs))]
    : due
}

function isUnscreened(row: TodayRowDto): boolean {
  return row.move.kind === 'move' && (row.move.step === 'screen' || row.move.step === 'complete_screen')
}

function toBedLine(row: TodayRowDto): BedLine {
  const isStarted = row.move.kind === 'move' && row.move.step === 'complete_screen'
  return { bedLabel: row.bedLabel, what: isStarted ? 'complete the screen' : 'screen' }
}

function decisionOwed(
  row: TodayRowDto,
  shared: { unitName: string; dayText: string; url: string },
  timeZone: string,
  nowMs: number,
): DueMessage[] {
  const { move } = row
  if (move.kind !== 'move' || move.step !== 'decide' || !move.isOverdue) return []
  const message = decisionOwedMessage({
    ...shared,
    bedLabel: row.bedLabel,
    passedText: formatTime(move.sinceMs, timeZone, nowMs),
  })
  return [{ kind: 'decision_owed', occasion: `${row.episodeId}:${move.sinceMs}`, toRoles: ['physician'], message }]
}
