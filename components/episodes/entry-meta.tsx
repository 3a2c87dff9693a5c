import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import type { EntryDto } from '@/lib/schemas/observed'
import { unlikelyNames } from './unlikely-names'

/** Who recorded an entry and when, with both times, and its marks: late, corrected, unlikely values kept. */
export function EntryMeta({ entry, timeZone, nowMs }: { entry: EntryDto; timeZone: string; nowMs: number }) {
  const unlikely = unlikelyNames(entry.unlikely)
  return (
    <p className="flex flex-wrap gap-x-3 text-sm text-muted">
      <span>
        Recorded {clockTime(entry.recordedAt, timeZone, nowMs)} by {entry.recordedByName}, protocol version {entry.protocolNumber}
      </span>
      {entry.isLate ? (
        <Tag shape="late" tone="muted">
          late entry
        </Tag>
      ) : null}
      {entry.isAmended ? (
        <Tag shape="info" tone="ink">
          corrected, version {entry.entryVersion}
          {entry.amendReason ? `: ${entry.amendReason}` : ''}
        </Tag>
      ) : null}
      {unlikely.length > 0 ? (
        <Tag shape="late" tone="stop">
          unusual, kept after a second look: {unlikely.join(', ')}
        </Tag>
      ) : null}
    </p>
  )
}
