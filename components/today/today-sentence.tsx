import { Mark } from '@/components/ui/mark'
import type { TodayDto } from '@/lib/schemas/today'

/** Where the unit stands, in one sentence. What nobody is in is left out, except who is ventilated and screened. */
export function TodaySentence({ counts }: { counts: TodayDto['counts'] }) {
  const parts = [
    { count: counts.screened, words: 'screened', always: true },
    { count: counts.ready, words: 'ready', always: false },
    { count: counts.onHold, words: 'on hold', always: false },
    { count: counts.onTrial, words: 'on trial', always: false },
    { count: counts.decisionsOwed, words: counts.decisionsOwed === 1 ? 'decision owed' : 'decisions owed', always: false },
  ].filter((part) => part.always || part.count > 0)
  return (
    <p className="text-lg text-muted">
      <Count of={counts.ventilated} /> ventilated:{' '}
      {parts.map((part, index) => (
        <span key={part.words}>
          {index > 0 ? ', ' : ''}
          <Count of={part.count} /> {part.words}
        </span>
      ))}
      {counts.overdue > 0 ? (
        <span className="font-semibold whitespace-nowrap text-stop">
          {' '}
          · <Mark shape="late" /> {counts.overdue} overdue
        </span>
      ) : null}
    </p>
  )
}

function Count({ of }: { of: number }) {
  return <strong className="figure text-ink">{of}</strong>
}
