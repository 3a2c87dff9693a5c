import { Button } from '@/components/ui/button'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'

type CarriedValuesProps = {
  /** When the values carried over were observed, UTC ms; nothing is drawn when all are confirmed. */
  observedAt: (number | undefined)[]
  onConfirm: () => void
  label: string
  timeZone: string
  nowMs: number
}

/** The age of a value carried over, and the one tap that confirms it. */
export function CarriedValues({ observedAt, onConfirm, label, timeZone, nowMs }: CarriedValuesProps) {
  const times = observedAt.filter((ms): ms is number => ms !== undefined)
  if (times.length === 0) return null
  const at = Math.min(...times)
  return (
    <Button
      variant="quiet"
      className="text-sm font-normal"
      onClick={onConfirm}
      aria-label={`Confirm ${label}, carried over from ${clockTime(at, timeZone, nowMs)}`}
    >
      {clockTime(at, timeZone, nowMs)}, {formatDuration(nowMs - at)} ago · tap to confirm
    </Button>
  )
}
