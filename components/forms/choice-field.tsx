'use client'

import type { FieldValues } from 'react-hook-form'
import { cn } from '@/lib/shared/cn'
import { GroupFrame, type FieldProps } from './field-frame'
import { describedBy, useField } from './use-field'

export type ChoiceValue = string | number | boolean
export type ChoiceOption = { value: ChoiceValue; label: string; note?: string }

type ChoiceFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  options: readonly ChoiceOption[]
  /** A way back to null, in these words ("not assessed"). Without it a choice once made stays made. */
  clearLabel?: string
  /** stacked: one below the other, for long labels. */
  layout?: 'segments' | 'stacked'
  onChosen?: (value: ChoiceValue | null) => void
}

/** One of a few: a radio group drawn as segments. Arrow keys move within it, as in every radio group. */
export function ChoiceField<Values extends FieldValues, Context, Output>(props: ChoiceFieldProps<Values, Context, Output>) {
  const {
    control,
    name,
    label,
    hint,
    beside,
    isLabelHidden,
    className,
    options,
    clearLabel,
    layout = 'segments',
    onChosen,
  } = props
  const { ids, path, value, error, register, change, blur } = useField({ control, name })
  const choose = (next: ChoiceValue | null) => {
    change(next)
    onChosen?.(next)
  }
  const choices: readonly { value: ChoiceValue | null; label: string; note?: string }[] = clearLabel
    ? [...options, { value: null, label: clearLabel }]
    : options
  const chosenIndex = choices.findIndex((option) => option.value === value)

  return (
    <GroupFrame
      role="radiogroup"
      ids={ids}
      label={label}
      hint={hint}
      error={error}
      beside={beside}
      isLabelHidden={isLabelHidden}
      className={className}
    >
      <span
        className={cn(
          'inline-flex max-w-full overflow-hidden rounded-control border bg-field',
          layout === 'stacked' ? 'w-full flex-col' : 'flex-wrap',
          error ? 'border-2 border-stop' : 'border-muted/80',
        )}
      >
        {choices.map((option, index) => {
          const isChosen = index === chosenIndex
          return (
            <label
              key={String(option.value)}
              className={cn(
                'focus-within-ring relative inline-flex min-h-[44px] min-w-[44px] cursor-pointer items-center gap-2 px-4 py-2 -outline-offset-4!',
                layout === 'segments' && 'justify-center text-center',
                isChosen && option.value !== null ? 'bg-ink font-semibold text-paper' : 'text-ink hover:bg-ink/5',
                option.value === null && (isChosen ? 'text-muted' : 'text-muted underline underline-offset-4'),
              )}
            >
              <input
                type="radio"
                name={`${ids.control}-${path}`}
                ref={index === Math.max(chosenIndex, 0) ? register : undefined}
                checked={isChosen}
                aria-describedby={describedBy(ids, hint, error)}
                className="absolute inset-0 size-full cursor-pointer appearance-none opacity-0"
                onChange={() => choose(option.value)}
                onBlur={blur}
              />
              <span>
                {option.label}
                {option.note ? (
                  <span className={cn('block text-sm font-normal', isChosen ? 'opacity-90' : 'text-muted')}>{option.note}</span>
                ) : null}
              </span>
            </label>
          )
        })}
      </span>
    </GroupFrame>
  )
}
