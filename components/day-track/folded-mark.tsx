import { cn } from '@/lib/shared/cn'

type FoldedMarkProps = { side: 'earlier' | 'later'; items: readonly string[] }

/** What lies before or after the axis: a mark at that end, its times on demand (tap, Enter or pointer). */
export function FoldedMark({ side, items }: FoldedMarkProps) {
  if (items.length === 0) return null
  const isEarlier = side === 'earlier'
  const title = isEarlier ? 'Before the axis' : 'After the axis'
  return (
    <details name="folded" className={cn('group absolute top-0 z-10', isEarlier ? 'left-0' : 'right-0')}>
      <summary
        title={items.join('\n')}
        className={cn(
          'flex h-[44px] w-[44px] cursor-pointer list-none items-end gap-0.5 pb-2 text-sm font-semibold text-ink [&::-webkit-details-marker]:hidden',
          isEarlier ? 'justify-start' : 'justify-end',
        )}
      >
        <svg viewBox="0 0 10 14" aria-hidden="true" className={cn('h-3.5 w-2.5', !isEarlier && 'order-2 -scale-x-100')}>
          <path
            d="M8.5 1.5 2 7l6.5 5.5"
            fill="none"
            stroke="currentColor"
            strokeWidth="2.2"
            strokeLinecap="round"
            strokeLinejoin="round"
          />
        </svg>
        <span className="figure">{items.length}</span>
        <span className="sr-only">{isEarlier ? 'earlier, before the axis' : 'later, after the axis'}</span>
      </summary>
      <ul
        aria-label={title}
        className={cn(
          'absolute top-[44px] z-20 w-max max-w-[min(20rem,80vw)] rounded-control border border-line bg-field px-4 py-3 text-sm',
          isEarlier ? 'left-0' : 'right-0',
        )}
      >
        {items.map((item) => (
          <li key={item}>{item}</li>
        ))}
      </ul>
    </details>
  )
}
