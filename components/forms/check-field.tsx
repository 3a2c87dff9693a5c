'use client'

import type { ReactNode } from 'react'
import type { FieldValues } from 'react-hook-form'
import { MarkPath, type MarkShape } from '@/components/ui/mark'
import { cn } from '@/lib/shared/cn'
import { FieldError, GroupFrame, type FieldProps } from './field-frame'
import { describedBy, useField } from './use-field'

type ToggleProps = {
  label: ReactNode
  isOn: boolean
  /** What being on means: a plain choice, or something that speaks against going on. */
  tone?: 'plain' | 'stop'
  invalid?: boolean
  describedBy?: string
  inputRef?: (element: HTMLInputElement | null) => void
  name?: string
  onToggle: (isOn: boolean) => void
  onBlur?: () => void
}

/** A checkbox as a large toggle: the mark in its box and the border both change, so that it reads without colour. */
export function Toggle({
  label,
  isOn,
  tone = 'plain',
  invalid,
  describedBy: described,
  inputRef,
  name,
  onToggle,
  onBlur,
}: ToggleProps) {
  const shape: MarkShape = tone === 'stop' ? 'dot' : 'tick'
  return (
    <label
      className={cn(
        'focus-within-ring relative inline-flex min-h-[48px] cursor-pointer items-center gap-3 rounded-control border bg-field px-4 py-2',
        isOn ? (tone === 'stop' ? 'border-stop font-semibold text-stop' : 'border-ink font-semibold') : 'border-muted/80',
        invalid && 'border-2 border-stop',
      )}
    >
      <input
        type="checkbox"
        name={name}
        ref={inputRef}
        checked={isOn}
        aria-invalid={invalid ? true : undefined}
        aria-describedby={described}
        className="absolute inset-0 size-full cursor-pointer appearance-none opacity-0"
        onChange={(event) => onToggle(event.target.checked)}
        onBlur={onBlur}
      />
      <svg viewBox="0 0 22 22" aria-hidden="true" className="size-[22px] shrink-0">
        <rect x="1" y="1" width="20" height="20" rx="4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        {isOn ? (
          <g transform="translate(3 3)">
            <MarkPath shape={shape} />
          </g>
        ) : null}
      </svg>
      <span>{label}</span>
    </label>
  )
}

type CheckFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  tone?: 'plain' | 'stop'
  onToggled?: (isOn: boolean) => void
}

/** One thing that is so or is not: the form holds true or false. */
export function CheckField<Values extends FieldValues, Context, Output>(props: CheckFieldProps<Values, Context, Output>) {
  const { control, name, label, hint, beside, className, tone, onToggled } = props
  const { ids, path, value, error, register, change, blur } = useField({ control, name })
  return (
    <div className={cn('flex min-w-0 flex-col gap-1.5', className)}>
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <Toggle
          label={label}
          isOn={value === true}
          tone={tone}
          invalid={Boolean(error)}
          describedBy={describedBy(ids, hint, error)}
          inputRef={register}
          name={path}
          onToggle={(isOn) => {
            change(isOn)
            onToggled?.(isOn)
          }}
          onBlur={blur}
        />
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

type CheckListFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  options: readonly { value: string; label: string }[]
  tone?: 'plain' | 'stop'
  onToggled?: (values: string[]) => void
}

/** Any number of a list: the form holds the words that are on, in the order of the list. */
export function CheckListField<Values extends FieldValues, Context, Output>(props: CheckListFieldProps<Values, Context, Output>) {
  const { control, name, label, hint, beside, isLabelHidden, className, options, tone, onToggled } = props
  const { ids, value, error, register, change, blur } = useField({ control, name })
  const on: unknown[] = Array.isArray(value) ? value : []
  const toggle = (value: string, isOn: boolean) => {
    const next = options.map((option) => option.value).filter((each) => (each === value ? isOn : on.includes(each)))
    change(next)
    onToggled?.(next)
  }
  return (
    <GroupFrame
      role="group"
      ids={ids}
      label={label}
      hint={hint}
      error={error}
      beside={beside}
      isLabelHidden={isLabelHidden}
      className={className}
    >
      <span className="grid w-full grid-cols-[repeat(auto-fill,minmax(min(15rem,100%),1fr))] gap-2">
        {options.map((option, index) => (
          <Toggle
            key={option.value}
            label={option.label}
            isOn={on.includes(option.value)}
            tone={tone}
            invalid={Boolean(error)}
            describedBy={describedBy(ids, hint, error)}
            inputRef={index === 0 ? register : undefined}
            onToggle={(isOn) => toggle(option.value, isOn)}
            onBlur={blur}
          />
        ))}
      </span>
    </GroupFrame>
  )
}
