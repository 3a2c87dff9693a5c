import type { KeyboardEvent, ReactNode } from 'react'
import { Mark, type MarkShape } from '@/components/ui/mark'
import { TONE_TEXT, type Tone } from '@/components/ui/tag'
import { cn } from '@/lib/shared/cn'
import type { CriterionMark } from '@/lib/weaning/vocabulary'
import { MARK_WORDS } from '@/lib/weaning/words'

export const MARK_LOOK: Record<CriterionMark, { shape: MarkShape; tone: Tone }> = {
  met: { shape: 'tick', tone: 'calm' },
  not_met: { shape: 'cross', tone: 'stop' },
  not_assessed: { shape: 'ring', tone: 'wait' },
}

type CriterionLineProps = {
  label: string
  /** Beside the label: "computed". */
  remark?: string
  /** What the criterion asks for, with its unit. */
  limit: ReactNode
  source: string | null
  mark: CriterionMark | null
  /** Why it could not be assessed, when it is not simply empty. */
  markNote?: string
  children: ReactNode
  onKeyDown?: (event: KeyboardEvent<HTMLElement>) => void
}

/** One criterion: label, input, limit with its source on demand, mark. On a phone the mark stands beside the label. */
export function CriterionLine({ label, remark, limit, source, mark, markNote, children, onKeyDown }: CriterionLineProps) {
  return (
    <div
      role="group"
      aria-label={label}
      className="grid grid-cols-[1fr_auto] items-center gap-x-4 gap-y-2 border-t border-line py-2.5 tablet:grid-cols-[10.5rem_minmax(0,1fr)_10rem_8.5rem] desk:grid-cols-[13rem_minmax(0,1fr)_13rem_9rem]"
      onKeyDown={onKeyDown}
    >
      <p className="font-semibold">
        {label}
        {remark ? <span className="ml-2 font-normal text-muted">{remark}</span> : null}
      </p>
      <div className="order-3 col-span-2 min-w-0 tablet:order-none tablet:col-span-1">{children}</div>
      <div className="order-4 col-span-2 text-muted tablet:order-none tablet:col-span-1">
        {source === null ? (
          limit
        ) : (
          <details>
            <summary className="flex min-h-[44px] cursor-pointer items-center gap-2 underline decoration-line decoration-2 underline-offset-4">
              <span>{limit}</span>
              <span className="sr-only">, source</span>
            </summary>
            <p className="pb-2 text-sm">{source}</p>
          </details>
        )}
      </div>
      <div className="order-2 tablet:order-none">{mark === null ? null : <CriterionMarkWord mark={mark} note={markNote} />}</div>
    </div>
  )
}

function CriterionMarkWord({ mark, note }: { mark: CriterionMark; note?: string }) {
  const look = MARK_LOOK[mark]
  return (
    <p className={cn('font-semibold', TONE_TEXT[look.tone])}>
      <span className="inline-flex items-baseline gap-1.5 whitespace-nowrap">
        <Mark shape={look.shape} className="translate-y-[0.06em]" />
        {MARK_WORDS[mark]}
      </span>
      {note ? <span className="block text-sm font-normal">{note}</span> : null}
    </p>
  )
}
