import Link from 'next/link'
import { EntryMeta } from '@/components/episodes/entry-meta'
import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import { cn } from '@/lib/shared/cn'
import type { RecordedDto } from '@/lib/schemas/patient-page'
import { amendHref } from './amend-href'
import { describeEntry } from './describe-entry'

type Props = { recorded: RecordedDto; episodeId: string; timeZone: string; nowMs: number }

/** One entry with its marks; earlier versions stay readable below it. */
export function EntryItem({ recorded, episodeId, timeZone, nowMs }: Props) {
  const { kind, entry, earlier, isWithdrawn, mayAmend } = recorded
  const words = describeEntry(kind, entry)
  const at = clockTime(entry.observedAt, timeZone, nowMs)
  return (
    <li className="grid gap-x-5 gap-y-1 border-t border-line py-3 tablet:grid-cols-[5.5rem_minmax(0,1fr)_auto]">
      <p className="figure text-lg font-semibold">{at}</p>
      <div className={cn('min-w-0', isWithdrawn && 'line-through')}>
        <p>
          <Tag shape={words.shape} tone={words.tone}>
            {words.title}
          </Tag>
          {isWithdrawn ? ' (withdrawn)' : ''}
        </p>
        {words.lines.map((line) => (
          <p key={line} className="max-w-reading">
            {line}
          </p>
        ))}
        <EntryMeta entry={entry} timeZone={timeZone} nowMs={nowMs} />
        {earlier.length > 0 ? (
          <details>
            <summary className="min-h-[44px] cursor-pointer py-2.5 text-sm underline decoration-line decoration-2 underline-offset-4">
              {earlier.length === 1 ? 'Earlier version' : `${earlier.length} earlier versions`}
            </summary>
            <ul className="border-l-4 border-line pl-4">
              {earlier.map((version) => {
                const before = describeEntry(kind, version)
                return (
                  <li key={version.id} className="py-2">
                    <p>
                      <span className="figure">{clockTime(version.observedAt, timeZone, nowMs)}</span> {before.title}
                    </p>
                    {before.lines.map((line) => (
                      <p key={line}>{line}</p>
                    ))}
                    <EntryMeta entry={version} timeZone={timeZone} nowMs={nowMs} />
                  </li>
                )
              })}
            </ul>
          </details>
        ) : null}
      </div>
      {mayAmend ? (
        <Link
          href={amendHref(episodeId, kind, entry.id)}
          className="inline-flex min-h-[44px] items-center"
          aria-label={`Correct ${words.title.toLowerCase()}, ${at}`}
        >
          Correct
        </Link>
      ) : null}
    </li>
  )
}
