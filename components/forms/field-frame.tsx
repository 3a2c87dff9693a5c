import type { ReactNode } from 'react'
import type { Control, FieldPath, FieldValues } from 'react-hook-form'
import { Mark } from '@/components/ui/mark'
import { cn } from '@/lib/shared/cn'
import { describedBy, type FieldIds } from './use-field'

/** What every field takes: where its value lives in the form, and its words. */
export type FieldProps<Values extends FieldValues, Context, Output> = {
  control: Control<Values, Context, Output>
  name: FieldPath<Values>
  label: string
  hint?: ReactNode
  /** Stands at the right of the control: the age of a value carried over, say. */
  beside?: ReactNode
  isLabelHidden?: boolean
  className?: string
}

export const CONTROL_LOOK =
  'min-h-[44px] rounded-control border border-muted/80 bg-field px-3.5 text-ink aria-invalid:border-2 aria-invalid:border-stop'

export function FieldError({ id, message }: { id: string; message: string | undefined }) {
  if (!message) return null
  return (
    <p id={id} className="flex items-baseline gap-1.5 font-semibold text-stop">
      <Mark shape="late" className="translate-y-[0.08em]" />
      <span>{message}</span>
    </p>
  )
}

type FieldFrameProps = {
  ids: FieldIds
  label: string
  hint?: ReactNode
  error: string | undefined
  beside?: ReactNode
  isLabelHidden?: boolean
  className?: string
  children: ReactNode
}

/** Label above, control, then the error and the hint, which the control names in aria-describedby. */
export function FieldFrame({ ids, label, hint, error, beside, isLabelHidden, className, children }: FieldFrameProps) {
  return (
    <div className={cn('flex min-w-0 flex-col gap-1.5', className)}>
      <label htmlFor={ids.control} className={cn('font-semibold', isLabelHidden && 'sr-only')}>
        {label}
      </label>
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        {children}
        {beside}
      </div>
      <FieldError id={ids.error} message={error} />
      {hint ? (
        <div id={ids.hint} className="text-sm text-muted">
          {hint}
        </div>
      ) : null}
    </div>
  )
}

/** The same for a group of choices, whose label is a legend. */
export function GroupFrame({
  ids,
  label,
  hint,
  error,
  beside,
  isLabelHidden,
  className,
  children,
  role,
}: FieldFrameProps & { role: 'radiogroup' | 'group' }) {
  return (
    <fieldset
      role={role}
      aria-describedby={describedBy(ids, hint, error)}
      aria-invalid={role === 'radiogroup' && error ? true : undefined}
      data-invalid={error ? '' : undefined}
      className={cn('flex min-w-0 flex-col gap-1.5', className)}
    >
      <legend className={cn('mb-1.5 font-semibold', isLabelHidden && 'sr-only')}>{label}</legend>
      <div className="flex flex-wrap items-center gap-x-3 gap-y-2">
        {children}
        {beside}
      </div>
      <FieldError id={ids.error} message={error} />
      {hint ? (
        <div id={ids.hint} className="text-sm text-muted">
          {hint}
        </div>
      ) : null}
    </fieldset>
  )
}
