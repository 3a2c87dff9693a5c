import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import { MINUTE_MS } from '@/lib/shared/time'

/** "Next observation due 09:45, in 4 min", or how late it is. */
export function DueLine({ what, dueMs, nowMs, timeZone }: { what: string; dueMs: number; nowMs: number; timeZone: string }) {
  const at = clockTime(dueMs, timeZone, nowMs)
  const lateMs = nowMs - dueMs
  if (lateMs >= MINUTE_MS)
    return (
      <Tag shape="late" tone="stop">
        {what} was due {at}, late by {formatDuration(lateMs)}
      </Tag>
    )
  if (lateMs >= 0)
    return (
      <Tag shape="dot" tone="dawn">
        {what} due now
      </Tag>
    )
  return (
    <span className="text-muted">
      {what} due {at}, in {lateMs > -MINUTE_MS ? 'less than 1 min' : formatDuration(lateMs)}
    </span>
  )
}
