import Link from 'next/link'

/** Our own mark: one breath over a horizon. */
export function BreathMark({ className }: { className?: string }) {
  return (
    <svg viewBox="0 0 32 24" aria-hidden="true" focusable="false" className={className}>
      <path d="M2 18c5.4 0 7-14 14-14s8.6 14 14 14" fill="none" className="stroke-dawn" strokeWidth="3" strokeLinecap="round" />
      <path d="M2 22h28" className="stroke-ink" strokeWidth="2.4" strokeLinecap="round" />
    </svg>
  )
}

/** Mark and name; leads to the first page. */
export function Brand() {
  return (
    <Link href="/" className="inline-flex min-h-[44px] items-center gap-2.5 text-ink no-underline">
      <BreathMark className="h-6 w-8" />
      <span className="text-lg font-bold tracking-tight">Daybreath</span>
    </Link>
  )
}
