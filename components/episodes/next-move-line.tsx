import Link from 'next/link'
import { Mark } from '@/components/ui/mark'
import { clockTime } from '@/lib/client/wall-clock'
import type { NextMove } from '@/lib/weaning/day-record'
import { describeMove } from '@/lib/weaning/describe-move'

type Props = {
  move: NextMove
  /** Where it is done; null when nothing is owed, or when the reader's role may not. */
  href: string | null
  timeZone: string
  nowMs: number
  label?: string
}

/** The next move, large: whose, what, by when. A link for those who may take it. */
export function NextMoveLine({ move, href, timeZone, nowMs, label = 'Next move' }: Props) {
  const { title, detail, lateness } = describeMove(move, (ms) => clockTime(ms, timeZone, nowMs), nowMs)
  return (
    <section aria-label={label} aria-live="polite" className="flex flex-col">
      <p className="text-sm text-muted">{label}</p>
      {href ? (
        <Link
          href={href}
          className="flex min-h-[44px] items-center text-2xl font-bold text-dawn underline decoration-2 underline-offset-4"
        >
          {title}
        </Link>
      ) : (
        <p className="text-2xl font-bold">{title}</p>
      )}
      <p className="text-muted">
        {detail}
        {lateness ? (
          <span className="font-semibold whitespace-nowrap text-stop">
            {detail ? ' · ' : ''}
            <Mark shape="late" /> {lateness}
          </span>
        ) : null}
      </p>
    </section>
  )
}
