import Link from 'next/link'
import { Mark } from '@/components/ui/mark'
import { cn } from '@/lib/shared/cn'
import type { TodayRowDto } from '@/lib/schemas/today'
import { moveWords } from './row-words'

type RowMoveProps = { row: TodayRowDto; isYours: boolean; mayMove: boolean; timeZone: string; nowMs: number }

/** Who, what, by when. A link to the step's form for those whose roles may take it, plain words for everybody else. */
export function RowMove({ row, isYours, mayMove, timeZone, nowMs }: RowMoveProps) {
  const { title, detail, lateness } = moveWords(row, timeZone, nowMs)
  const look = cn('font-bold', isYours ? 'text-dawn' : 'text-ink')
  return (
    <div className="leading-snug">
      {mayMove && row.moveHref ? (
        <Link
          href={row.moveHref}
          prefetch={false}
          className={cn(look, 'relative z-10 -my-2 flex min-h-[44px] items-center underline decoration-2 underline-offset-4')}
        >
          <span>
            {title}
            <span className="sr-only">, bed {row.bedLabel}</span>
          </span>
        </Link>
      ) : (
        <p className={look}>{title}</p>
      )}
      <p className="text-sm text-muted">
        {detail}
        {lateness && detail ? ' · ' : null}
        {lateness ? (
          <span className="font-semibold whitespace-nowrap text-stop">
            <Mark shape="late" /> {lateness}
          </span>
        ) : null}
      </p>
    </div>
  )
}
