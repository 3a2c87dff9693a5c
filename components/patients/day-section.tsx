import { shortDay } from '@/lib/client/wall-clock'
import type { PatientDayDto } from '@/lib/schemas/patient-page'
import { daySummary } from './day-summary'
import { EntryItem } from './entry-item'

type Props = {
  day: PatientDayDto
  all: readonly PatientDayDto[]
  episodeId: string
  timeZone: string
  nowMs: number
  isOpen: boolean
}

/** One ventilator day: a summary line, and every entry one tap away. */
export function DaySection({ day, all, episodeId, timeZone, nowMs, isOpen }: Props) {
  return (
    <section className="border-t-2 border-ink pt-3 pb-5" aria-labelledby={`day-${day.day}`}>
      <h3 id={`day-${day.day}`} className="text-lg font-bold">
        {day.dayNumber === null ? 'After ventilation' : `Ventilator day ${day.dayNumber}`}{' '}
        <span className="font-normal text-muted">{shortDay(day.day)}</span>
      </h3>
      {day.dayNumber === null ? null : (
        <dl className="mt-1 grid gap-x-6 gap-y-1 tablet:grid-cols-2 desk:grid-cols-4">
          {daySummary(day, all).map(({ label, words }) => (
            <div key={label} className="min-w-0">
              <dt className="text-sm text-muted">{label}</dt>
              <dd className={words === 'Not recorded' ? 'text-muted' : ''}>{words}</dd>
            </div>
          ))}
        </dl>
      )}
      <details open={isOpen}>
        <summary className="min-h-[44px] cursor-pointer py-2.5 underline decoration-line decoration-2 underline-offset-4">
          {day.entries.length} {day.entries.length === 1 ? 'entry' : 'entries'}
        </summary>
        <ul>
          {day.entries.map((recorded) => (
            <EntryItem key={recorded.entry.entryId} recorded={recorded} episodeId={episodeId} timeZone={timeZone} nowMs={nowMs} />
          ))}
        </ul>
      </details>
    </section>
  )
}
