import type { ReactNode } from 'react'

type PageHeadingProps = {
  title: string
  /** A line above the title: bed and patient, or the way back. */
  above?: ReactNode
  /** A sentence below the title. */
  below?: ReactNode
  /** Stands at the right on wide screens, below on narrow ones. */
  aside?: ReactNode
}

/** The one h1 of a page. */
export function PageHeading({ title, above, below, aside }: PageHeadingProps) {
  return (
    <header className="mb-6 flex flex-wrap items-end justify-between gap-x-8 gap-y-4">
      <div className="min-w-0">
        {above ? <div className="mb-1 text-muted">{above}</div> : null}
        <h1 className="text-2xl font-bold tracking-tight tablet:text-3xl">{title}</h1>
        {below ? <div className="mt-2 text-muted">{below}</div> : null}
      </div>
      {aside ? <div className="min-w-0">{aside}</div> : null}
    </header>
  )
}
