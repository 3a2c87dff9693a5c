import type { ReactNode } from 'react'
import { Mark, type MarkShape } from '@/components/ui/mark'

const ITEMS: readonly { shape: MarkShape; words: string }[] = [
  { shape: 'tick', words: 'ready, tolerated or passed' },
  { shape: 'cross', words: 'not ready, not tolerated or failed' },
  { shape: 'ring', words: 'incomplete' },
  { shape: 'dash', words: 'excused or not needed' },
  { shape: 'diamond', words: 'unsafe to hold' },
  { shape: 'square', words: 'stopped for another reason' },
  { shape: 'hatch', words: 'sedation hold' },
  { shape: 'bar', words: 'breathing trial, dots are observations' },
  { shape: 'flag', words: 'decision to extubate' },
  { shape: 'flagOpen', words: 'another decision' },
]

/** What the marks of the day track mean. */
export function TrackLegend({ children }: { children?: ReactNode }) {
  return (
    <div className="flex flex-wrap gap-x-5 gap-y-1 text-sm text-muted">
      {ITEMS.map(({ shape, words }) => (
        <span key={shape} className="inline-flex items-center gap-1.5">
          <Mark shape={shape} />
          {words}
        </span>
      ))}
      <span className="inline-flex items-center gap-1.5">
        <span aria-hidden="true" className="inline-block h-3 w-5 bg-band" /> pairing window
      </span>
      {children}
    </div>
  )
}
