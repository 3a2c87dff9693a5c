import type { ReactNode } from 'react'
import { cn } from '@/lib/shared/cn'

type ValueProps = {
  /** Already formatted; null reads "not assessed". */
  value: string | null
  unit?: string
  size?: 'inline' | 'medium' | 'large' | 'clock'
  /** What stands instead when there is no value. */
  missing?: string
  className?: string
}

const SIZES = {
  inline: 'text-[1em]',
  medium: 'text-xl',
  large: 'text-[28px] leading-9',
  clock: 'text-5xl leading-none tablet:text-6xl',
} as const

/** A measured or computed number: tabular, with its unit beside it. */
export function Value({ value, unit, size = 'medium', missing = 'not assessed', className }: ValueProps) {
  if (value === null) return <span className={cn('text-muted', className)}>{missing}</span>
  return (
    <span className={cn('whitespace-nowrap', className)}>
      <span className={cn('figure font-semibold text-ink', SIZES[size])}>{value}</span>
      {unit ? <span className="ml-1.5 text-[0.9rem] text-muted">{unit}</span> : null}
    </span>
  )
}

/** One value with its label above and remarks below, as in a row of readings. */
export function LabelledValue({ label, children, ...value }: ValueProps & { label: string; children?: ReactNode }) {
  return (
    <div className="border-t border-line pt-3">
      <dt className="text-muted">{label}</dt>
      <dd>
        <Value size="large" {...value} />
        {children}
      </dd>
    </div>
  )
}
