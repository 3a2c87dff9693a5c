import type { ReactNode } from 'react'
import { cn } from '@/lib/shared/cn'
import { Mark, type MarkShape } from './mark'

export type Tone = 'ink' | 'muted' | 'dawn' | 'calm' | 'wait' | 'stop'

export const TONE_TEXT: Record<Tone, string> = {
  ink: 'text-ink',
  muted: 'text-muted',
  dawn: 'text-dawn',
  calm: 'text-calm',
  wait: 'text-wait',
  stop: 'text-stop',
}

/** A state in a mark and a word, on one line. */
export function Tag({
  shape,
  tone,
  children,
  className,
}: {
  shape: MarkShape
  tone: Tone
  children: ReactNode
  className?: string
}) {
  return (
    <span className={cn('inline-flex items-baseline gap-1.5 font-semibold', TONE_TEXT[tone], className)}>
      <Mark shape={shape} className="translate-y-[0.06em]" />
      <span>{children}</span>
    </span>
  )
}
