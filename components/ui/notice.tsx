import type { ReactNode } from 'react'
import { cn } from '@/lib/shared/cn'
import { Mark, type MarkShape } from './mark'
import { TONE_TEXT, type Tone } from './tag'

export type NoticeTone = 'info' | 'calm' | 'wait' | 'stop'

const LOOK: Record<NoticeTone, { shape: MarkShape; tone: Tone; word: string; edge: string }> = {
  info: { shape: 'info', tone: 'ink', word: 'Note', edge: 'border-ink' },
  calm: { shape: 'tick', tone: 'calm', word: 'Done', edge: 'border-calm' },
  wait: { shape: 'pause', tone: 'wait', word: 'Waiting', edge: 'border-wait' },
  stop: { shape: 'late', tone: 'stop', word: 'Attention', edge: 'border-stop' },
}

type NoticeProps = {
  tone: NoticeTone
  /** The word beside the mark; each tone has a plain one of its own. */
  title?: string
  children?: ReactNode
  /** alert: spoken at once. status: spoken when the reader pauses. Leave out for what stands on the page from the start. */
  role?: 'alert' | 'status'
  className?: string
}

/** A few sentences that stand apart: mark, word, text. */
export function Notice({ tone, title, children, role, className }: NoticeProps) {
  const look = LOOK[tone]
  return (
    <div role={role} className={cn('border-l-4 py-1 pl-4', look.edge, className)}>
      <p className={cn('flex items-center gap-2 font-semibold', TONE_TEXT[look.tone])}>
        <Mark shape={look.shape} />
        <span>{title ?? look.word}</span>
      </p>
      {children ? <div className="text-ink">{children}</div> : null}
    </div>
  )
}
